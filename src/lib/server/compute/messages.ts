import type { MessagePort } from 'node:worker_threads';
import type { Equilibrium, ForcePoint, ForceRequest, Warning, WholeAnalysis } from '../../engine/contract.ts';
import type { Issue } from '../errors.ts';

/** What travels between the pool and a thread. */

export interface Task {
	request: ForceRequest;
	/** Where the thread writes to; the pool holds the other end. */
	port: MessagePort;
	/** One shared number: anything but zero asks the thread to stop. It is looked at before each point. */
	stop: Int32Array;
}

export interface Start {
	/** Distances of the curve in the order of the answer. */
	separationsNm: number[];
}

export interface Chunk {
	/** Which points of the answer these are: they come coarse to fine. */
	indices: number[];
	points: ForcePoint[];
}

export interface End extends WholeAnalysis {
	equilibria: Equilibrium[];
	warnings: Warning[];
}

export type Message =
	| { type: 'begun' }
	| ({ type: 'start' } & Start)
	| ({ type: 'points' } & Chunk)
	| ({ type: 'end' } & End)
	| { type: 'refused'; issues: Issue[] }
	| { type: 'stopped' };
