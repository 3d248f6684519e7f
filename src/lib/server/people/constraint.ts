/** The name of the constraint that refused a statement; drizzle hides the driver's error in the cause. */
export function failingOf(error: unknown): string | undefined {
	for (let inner = error; inner instanceof Error; inner = inner.cause) {
		const name = (inner as Error & { constraint_name?: unknown }).constraint_name;
		if (typeof name === 'string') return name;
	}
	return undefined;
}
