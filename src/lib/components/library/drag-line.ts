import type { Attachment } from 'svelte/attachments';

/** Lets a pointer move the hairline from anywhere in the column of bars, not only by its handle. */
interface LineDrag {
	/** The drawn axis: its box turns pixels into per cent. */
	axis: () => HTMLElement | null;
	onmove: (percent: number) => void;
	onsettle: () => void;
}

/** A finger on a row means to scroll; only a mouse or a pen takes the line there. The axis itself takes all three. */
export function dragLine({ axis, onmove, onsettle }: LineDrag): Attachment<HTMLElement> {
	return (element) => {
		let pointer: number | null = null;

		const percentAt = (event: PointerEvent): number => {
			const box = axis()?.getBoundingClientRect();
			return box === undefined ? 0 : ((event.clientX - box.left) / box.width) * 100;
		};
		const grab = (event: PointerEvent) => {
			const target = event.target instanceof Element ? event.target : null;
			const onAxis = target?.closest('[data-energy-axis]') != null;
			const onBar = target?.closest('[data-energy-bar]') != null;
			if (event.button !== 0 || !(onAxis || (onBar && event.pointerType !== 'touch'))) return;
			event.preventDefault();
			pointer = event.pointerId;
			element.setPointerCapture(pointer);
			onmove(percentAt(event));
		};
		const move = (event: PointerEvent) => {
			if (event.pointerId === pointer) onmove(percentAt(event));
		};
		const release = (event: PointerEvent) => {
			if (event.pointerId !== pointer) return;
			pointer = null;
			onsettle();
		};

		element.addEventListener('pointerdown', grab);
		element.addEventListener('pointermove', move);
		element.addEventListener('pointerup', release);
		element.addEventListener('pointercancel', release);
		return () => {
			element.removeEventListener('pointerdown', grab);
			element.removeEventListener('pointermove', move);
			element.removeEventListener('pointerup', release);
			element.removeEventListener('pointercancel', release);
		};
	};
}
