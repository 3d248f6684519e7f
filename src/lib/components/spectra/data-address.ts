/** A data address as bytes, without a request: the content policy allows none to `data:`. */
export function blobOfDataAddress(address: string): Blob {
	const comma = address.indexOf(',');
	const head = /^data:([^;,]*)(;[^,]*)?$/.exec(address.slice(0, comma));
	if (head === null) throw new RangeError('not a data address');
	const [, type, options = ''] = head;
	const body = address.slice(comma + 1);
	if (!options.includes(';base64')) return new Blob([decodeURIComponent(body)], { type });
	const bytes = Uint8Array.from(atob(body), (character) => character.charCodeAt(0));
	return new Blob([bytes], { type });
}
