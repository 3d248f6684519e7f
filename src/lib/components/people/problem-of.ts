/** What was wrong with a field of the form that came back. */
export function problemOf(
	issues: readonly { path: string; message: string }[] | undefined,
	name: string
): string | undefined {
	return issues?.find(({ path }) => path === name || path.startsWith(`${name}[`))?.message;
}
