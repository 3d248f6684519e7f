import { Refusal, prepare } from '../../engine/index.ts';
import type { ForcePoint } from '../../engine/contract.ts';
import type { Message, Task } from './messages.ts';
import { coarseToFine } from './order.ts';

/** Runs in a thread of the pool. Engine refusals are told as data: an error's own fields do not cross threads. */

/** Often enough that a curve grows smoothly, seldom enough that copying costs nothing. */
const CHUNK_MS = 40;

export default function run({ request, port, stop }: Task): void {
	const tell = (message: Message) => port.postMessage(message);
	try {
		tell({ type: 'begun' });
		compute(request, tell, () => Atomics.load(stop, 0) !== 0);
	} catch (error) {
		if (!(error instanceof Refusal)) throw error;
		tell({ type: 'refused', issues: error.issues });
	}
}

function compute(request: Task['request'], tell: (message: Message) => void, mustStop: () => boolean): void {
	if (mustStop()) return tell({ type: 'stopped' });
	const preparation = prepare(request);
	const separationsNm = [...preparation.separationsNm];
	tell({ type: 'start', separationsNm });

	const { order, overview } = coarseToFine(separationsNm.length);
	const all: ForcePoint[] = new Array(separationsNm.length);
	let indices: number[] = [];
	const flush = () => {
		if (indices.length > 0) tell({ type: 'points', indices, points: indices.map((index) => all[index]) });
		indices = [];
	};
	let sentAt = performance.now();
	for (const [position, index] of order.entries()) {
		if (mustStop()) return tell({ type: 'stopped' });
		all[index] = preparation.point(index);
		indices.push(index);
		if (position + 1 === overview || performance.now() - sentAt > CHUNK_MS) {
			flush();
			sentAt = performance.now();
		}
	}
	flush();
	tell({
		type: 'end',
		equilibria: preparation.equilibria(all),
		warnings: preparation.warnings(all),
		...preparation.whole()
	});
}
