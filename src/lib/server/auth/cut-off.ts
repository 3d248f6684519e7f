/** Ends an answer under way when whoever asked for it loses their access: a stream may outlive a session by little. */

const LOOK_EVERY_MS = 2000;

export function endingWithAccess(
	body: ReadableStream<Uint8Array>,
	stillIn: () => Promise<boolean>,
	everyMs = LOOK_EVERY_MS
): ReadableStream<Uint8Array> {
	const reader = body.getReader();
	let timer: NodeJS.Timeout | undefined;
	const cut = async (controller: ReadableStreamDefaultController<Uint8Array>) => {
		clearInterval(timer);
		controller.error(new Error('Access ended.'));
		// The work behind the stream stops with it.
		await reader.cancel();
	};
	return new ReadableStream<Uint8Array>({
		start(controller) {
			timer = setInterval(() => {
				stillIn().then(
					(yes) => (yes ? undefined : cut(controller)),
					// Not to know is no reason to go on.
					() => cut(controller)
				);
			}, everyMs);
			timer.unref();
		},
		async pull(controller) {
			const { done, value } = await reader.read();
			if (!done) return controller.enqueue(value);
			clearInterval(timer);
			controller.close();
		},
		async cancel(reason) {
			clearInterval(timer);
			await reader.cancel(reason);
		}
	});
}
