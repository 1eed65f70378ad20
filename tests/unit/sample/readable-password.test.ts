import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { acceptPassword } from '#server/auth/passwords.ts';
import { readablePassword } from '#server/sample/readable-password.ts';

describe('the sample’s passwords', () => {
  it('are four made-up words and four digits that the product itself would accept', () => {
    fc.assert(
      fc.property(fc.infiniteStream(fc.nat()), (numbers) => {
        const password = readablePassword((below) => Number(numbers.next().value) % below);
        expect(password).toMatch(/^([a-z]{6}-){4}\d{4}$/);
      }),
    );
    for (let at = 0; at < 100; at += 1) {
      expect(acceptPassword(readablePassword(), ['Priya Anand', 'priya@example.org', 'gablebook']).ok).toBe(true);
    }
  });

  it('differ from one installation to the next', () => {
    expect(new Set(Array.from({ length: 200 }, () => readablePassword())).size).toBe(200);
  });
});
