import type { IncomingMessage } from 'node:http';

/**
 * Tells when whoever waits for the answer has hung up. The signal of a request only covers the time until its body is
 * read; after that the connection itself is the only witness.
 */
export function callerGone(
	request: Request,
	incoming: IncomingMessage | undefined
): { gone: AbortSignal; forget: () => void } {
	const hungUp = new AbortController();
	const onClose = () => hungUp.abort();
	incoming?.socket.once('close', onClose);
	return {
		gone: AbortSignal.any([request.signal, hungUp.signal]),
		// The connection may serve many more requests.
		forget: () => incoming?.socket.off('close', onClose)
	};
}
