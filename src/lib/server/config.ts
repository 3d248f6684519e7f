import { availableParallelism } from 'node:os';
import { z } from 'zod';

/** Settings from the environment, read once on first use so that a build needs none of them. */

/** More would only wait for each other: a computation is bound by the processor. */
const THREADS_BY_DEFAULT = Math.min(2, availableParallelism());

const settings = z.object({
	HAIRSBREADTH_DATABASE_URL: z
		.string({ error: 'HAIRSBREADTH_DATABASE_URL is missing: npm start sets it, a deployment must' })
		.regex(/^postgres(ql)?:\/\//, 'HAIRSBREADTH_DATABASE_URL must be a postgres:// address'),
	HAIRSBREADTH_THREADS: z.coerce
		.number({ error: 'HAIRSBREADTH_THREADS must be a whole number from 1 to 64' })
		.int('HAIRSBREADTH_THREADS must be a whole number from 1 to 64')
		.min(1, 'HAIRSBREADTH_THREADS must be at least 1')
		.max(64, 'HAIRSBREADTH_THREADS must be at most 64')
		.default(THREADS_BY_DEFAULT),
	HAIRSBREADTH_COMPUTE_SECONDS: z.coerce
		.number({ error: 'HAIRSBREADTH_COMPUTE_SECONDS must be a number of seconds' })
		.positive('HAIRSBREADTH_COMPUTE_SECONDS must be above zero')
		.default(60),
	HAIRSBREADTH_ENGINE_TASK: z.string().min(1, 'HAIRSBREADTH_ENGINE_TASK must name a file').optional(),
	HAIRSBREADTH_LOG_LEVEL: z
		.enum(['debug', 'info', 'warn', 'error', 'silent'], {
			error: 'HAIRSBREADTH_LOG_LEVEL must be one of debug, info, warn, error, silent'
		})
		.optional(),
	HAIRSBREADTH_LOG_FILE: z.string().min(1, 'HAIRSBREADTH_LOG_FILE must name a file').optional(),
	HAIRSBREADTH_DURABILITY: z
		.enum(['full', 'throwaway'], { error: 'HAIRSBREADTH_DURABILITY must be full or throwaway' })
		.default('full')
});

/** What the adapter would otherwise guess, and guess too openly: it listens on every address when not told. */
const servingSettings = z.object({
	ORIGIN: z
		.url({ protocol: /^https?$/, error: 'ORIGIN must be the public address, as https://gaps.example.org' })
		.refine((text) => !text.endsWith('/'), 'ORIGIN must not end with a slash'),
	BODY_SIZE_LIMIT: z
		.string({ error: 'BODY_SIZE_LIMIT is missing: say the largest body accepted, as 6M' })
		.regex(/^\d+[KMG]?$/i, 'BODY_SIZE_LIMIT must be a number of bytes, as 6M; unlimited is not accepted'),
	HOST: z.string({ error: 'HOST is missing: say where to listen, as 127.0.0.1' }).min(1)
});

export interface Config {
	databaseUrl: string;
	/** Threads that run the engine. */
	threads: number;
	/** Seconds of computing that one caller may ask for in a minute. */
	computeSecondsPerMinute: number;
	/** The engine's thread module where the default place is not right. */
	engineTask?: string;
	logLevel?: 'debug' | 'info' | 'warn' | 'error' | 'silent';
	logFile?: string;
	/** A throw-away database may run without fsync; nothing else may. */
	durability: 'full' | 'throwaway';
}

let current: Config | undefined;

export function config(): Config {
	current ??= readConfig(process.env);
	return current;
}

/** @throws Error that names every setting that is wrong, and how. */
export function readConfig(environment: NodeJS.ProcessEnv): Config {
	const parsed = settings.safeParse(environment);
	if (!parsed.success) throw new Error(z.prettifyError(parsed.error));
	const found = parsed.data;
	return {
		databaseUrl: found.HAIRSBREADTH_DATABASE_URL,
		threads: found.HAIRSBREADTH_THREADS,
		computeSecondsPerMinute: found.HAIRSBREADTH_COMPUTE_SECONDS,
		engineTask: found.HAIRSBREADTH_ENGINE_TASK,
		logLevel: found.HAIRSBREADTH_LOG_LEVEL,
		logFile: found.HAIRSBREADTH_LOG_FILE,
		durability: found.HAIRSBREADTH_DURABILITY
	};
}

/** What must be stated before the built application serves people. @throws Error naming what is missing. */
export function checkServing(environment: NodeJS.ProcessEnv): void {
	const parsed = servingSettings.safeParse(environment);
	if (!parsed.success) throw new Error(z.prettifyError(parsed.error));
}
