import { z } from 'zod';

/**
 * Text that a person typed. Control characters and halves of surrogate pairs have no business in it, and the database
 * would refuse some of them with an error instead of an answer.
 */

const LINE = /^[^\p{Cc}\p{Cs}]*$/u;
const LINES = /^(?:[^\p{Cc}\p{Cs}]|[\n\r\t])*$/u;
const WHY = 'no control characters';

export const line = (max: number) => z.string().trim().min(1, 'write something').max(max).regex(LINE, WHY);

export const lines = (max: number) => z.string().trim().min(1, 'write something').max(max).regex(LINES, WHY);
