import type { IncomingMessage } from 'node:http';

/**
 * Tells when whoever waits for the answer has hung up. The signal of a request only covers the time until its body is
 * read; after that the connection itself is the only witness.
 *
 * @param platform what the adapter adds to an event; there is nothing in development
 */
export function callerGone(
	request: Request,
	platform: { req?: IncomingMessage } | undefined
): { gone: AbortSignal; forget: () => void } {
	const hungUp = new AbortController();
	const socket = platform?.req?.socket;
	const onClose = () => hungUp.abort();
	socket?.once('close', onClose);
	return {
		gone: AbortSignal.any([request.signal, hungUp.signal]),
		// The connection may serve many more requests.
		forget: () => socket?.off('close', onClose)
	};
}
