/** Requests to POST /api/v1/forces for tests of the interface; what the numbers are is tested with the engine. */

interface Body {
	layers: { of: unknown; thicknessNm: unknown }[];
	substrate: unknown;
}

export interface Request {
	arrangement: {
		left: Body;
		medium: unknown;
		right: Body;
		shape: unknown;
		temperatureK: unknown;
		debyeLengthNm?: unknown;
	};
	separationsNm: unknown;
	relativeAccuracy: unknown;
	include: unknown;
}

export const silica = { permittivity: { kind: 'constant', value: 3.8 } };
export const vacuum = { permittivity: { kind: 'vacuum' } };
export const gold = { version: 'gold-lorentz-drude@1.0' };

/** Valid in every field; `change` may spoil it. A new temperature makes a computation that no cache knows. */
export function aRequest(change: (request: Request) => void = () => undefined): Request {
	const request: Request = {
		arrangement: {
			left: { layers: [{ of: silica, thicknessNm: 20 }], substrate: gold },
			medium: vacuum,
			right: { layers: [], substrate: gold },
			shape: { kind: 'plates' },
			temperatureK: 300
		},
		separationsNm: [20, 50, 100],
		relativeAccuracy: 1e-6,
		include: []
	};
	change(request);
	return request;
}

export function post(
	origin: string,
	body: unknown,
	headers: Record<string, string> = {},
	signal?: AbortSignal
): Promise<Response> {
	return fetch(`${origin}/api/v1/forces`, {
		method: 'POST',
		headers: { 'content-type': 'application/json', ...headers },
		body: typeof body === 'string' ? body : JSON.stringify(body),
		signal
	});
}
