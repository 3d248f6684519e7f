/** Hands a file to the reader's browser. */
export function saveFile(name: string, content: string | Blob, type: string): void {
	const address = URL.createObjectURL(new Blob([content], { type }));
	const link = document.createElement('a');
	link.href = address;
	link.download = name;
	link.click();
	// The browser has to have begun reading before the address goes.
	setTimeout(() => URL.revokeObjectURL(address), 1000);
}
