import { hash, verify } from '@node-rs/argon2';
import { PASSWORD_MAX, PASSWORD_MIN } from '#shared/api/session.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import { COMMON_PASSWORDS } from './common-passwords.ts';

/**
 * argon2id (the library's default algorithm) with 64 MiB, 3 passes, 1 lane: above the minimum of OWASP's Password Storage Cheat Sheet (19 MiB, 2, 1), about a twentieth of a
 * second here. The four threads of the pool bound how many run at once.
 */
const OPTIONS = { memoryCost: 65_536, timeCost: 3, parallelism: 1 };

/** A password as it is compared: the same letters typed on another keyboard are the same password (NIST SP 800-63B-4, NFKC). */
function normal(password: string): string {
  return password.normalize('NFKC');
}

export function hashPassword(password: string): Promise<string> {
  return hash(normal(password), OPTIONS);
}

let dummy: Promise<string> | null = null;

/** Verifies a password; for an unknown user (null) it takes as long and is always false. */
export async function verifyPassword(passwordHash: string | null, password: string): Promise<boolean> {
  if (passwordHash === null) {
    dummy ??= hashPassword('no user has this password, and none will');
    await verify(await dummy, normal(password));
    return false;
  }
  return verify(passwordHash, normal(password));
}

/** True for a text that is one short piece over and over: "sunsunsunsunsun". */
function isRepeat(text: string): boolean {
  for (let size = 1; size <= Math.min(8, Math.floor(text.length / 2)); size += 1) {
    const piece = text.slice(0, size);
    if (piece.repeat(Math.ceil(text.length / size)).slice(0, text.length) === text) return true;
  }
  return false;
}

/** True for letters or digits that only count up or down: "abcdefghijklmno". */
function isRun(text: string): boolean {
  const steps = new Set<number>();
  for (let index = 1; index < text.length; index += 1) {
    const step = text.charCodeAt(index) - text.charCodeAt(index - 1);
    steps.add(step === -9 ? 1 : step === 9 ? -1 : step);
  }
  return steps.size === 1;
}

/**
 * Whether a password may be chosen: long enough, not too long, not among the common ones, not built from the person's own name, address or
 * the household. `about` holds those words. No rule on composition (NIST SP 800-63B-4).
 */
export function acceptPassword(password: string, about: readonly string[]): Result<string> {
  const chosen = normal(password);
  const length = [...chosen].length;
  if (length < PASSWORD_MIN)
    return fail('password-too-short', `Use ${PASSWORD_MIN} characters or more; a short sentence is easy to keep.`);
  if (length > PASSWORD_MAX) return fail('invalid-fields', `Use at most ${PASSWORD_MAX} characters.`);
  const bare = chosen.toLowerCase().replaceAll(/[\s\-_.,;:'"/+]/g, '');
  if (COMMON_PASSWORDS.has(bare) || isRun(bare)) {
    return fail('password-too-common', 'This password is on the lists that are tried first. Choose another.');
  }
  if (isRepeat(bare)) return fail('password-too-common', 'This password repeats one short piece. Choose another.');
  let rest = bare;
  for (const word of about.flatMap((text) => text.toLowerCase().split(/[\s@.]+/)).filter((word) => word.length >= 3)) {
    rest = rest.replaceAll(word, '');
  }
  if (rest.replaceAll(/\d/g, '').length < 4) {
    return fail('password-too-common', 'This password is made of your name or address. Choose another.');
  }
  return succeed(chosen);
}
