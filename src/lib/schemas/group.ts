import { z } from 'zod';

export const groupName = z
	.string({ error: 'give the group a name' })
	.trim()
	.min(2, 'a group name has at least 2 characters')
	.max(80, 'a group name has at most 80 characters')
	.regex(/^[^\p{Cc}]*$/u, 'a group name has no control characters');

export const groupSlug = z
	.string()
	.trim()
	.regex(/^[a-z0-9]+(-[a-z0-9]+)*$/, 'use small letters, digits and single hyphens')
	.max(60, 'at most 60 characters');

export const newGroup = z.strictObject({ name: groupName, slug: groupSlug });
export type NewGroup = z.infer<typeof newGroup>;
