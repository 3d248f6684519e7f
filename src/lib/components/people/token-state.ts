export function tokenState(
	{ revokedAt, expiresAt }: { revokedAt: string | null; expiresAt: string },
	at = new Date()
): 'works' | 'revoked' | 'expired' {
	if (revokedAt) return 'revoked';
	return new Date(expiresAt) <= at ? 'expired' : 'works';
}
