import { describe, expect, it } from 'vitest';
import { write } from './letters.ts';
import { render } from './render.ts';

const origin = 'https://gaps.example.org';

describe('a mail', () => {
	it('shows what people typed as text, never as markup or as a header', () => {
		const inviter = '<img src=x onerror=alert(1)>\r\nBcc: all@example.org';
		const data = { inviter, role: 'reader', group: '"><script>', days: 14 };
		const { subject, text, html } = render(
			write('invitation', data, origin, `${origin}/invitation?code=a&b`)
		);
		expect(html).not.toMatch(/<img|<script/);
		expect(html).toContain('&lt;img src=x');
		expect(html).toContain(`href="${origin}/invitation?code=a&amp;b"`);
		expect(text).toContain(`${origin}/invitation?code=a&b`);
		expect(subject).not.toMatch(/[\r\n]/);
		const forged = render({ subject: 'Hello\r\nBcc: all@example.org', paragraphs: [] });
		expect(forged.subject).toBe('Hello Bcc: all@example.org');
	});

	it('refuses a kind that it does not know', () => {
		expect(() => write('advertisement', {}, origin, null)).toThrow('advertisement');
	});
});
