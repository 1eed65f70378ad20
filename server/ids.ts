import { randomBytes } from 'node:crypto';

const LETTERS = '0123456789abcdefghjkmnpqrstvwxyz';

/** A new id: 20 letters and digits, 100 random bits. */
export function newId(): string {
  return [...randomBytes(20)].map((byte) => LETTERS[byte % LETTERS.length]).join('');
}
