import * as z from 'zod/mini';
import { endpoint } from './endpoint.ts';

export const roleSchema = z.enum(['owner', 'member', 'preparer']);

/** Passwords: 15 characters or more, any composition, at most 256 (NIST SP 800-63B-4). */
export const PASSWORD_MIN = 15;
export const PASSWORD_MAX = 256;

export const sessionView = z.object({
  user: z.object({ id: z.string(), name: z.string(), email: z.string() }),
  households: z.array(z.object({ id: z.string(), name: z.string(), role: roleSchema })),
});
export type SessionView = z.infer<typeof sessionView>;

export const emailSchema = z
  .email({ error: 'Write an e-mail address such as name@example.org.' })
  .check(z.maxLength(254));
export const personName = z.string().check(z.trim(), z.minLength(1, { error: 'Write a name.' }), z.maxLength(80));

export const signInBody = z.strictObject({
  email: z.string().check(z.maxLength(254)),
  password: z.string().check(z.maxLength(1024)),
});
export const signUpBody = z.strictObject({
  name: personName,
  email: emailSchema,
  password: z
    .string()
    .check(
      z.minLength(PASSWORD_MIN, { error: 'Use 15 characters or more; a short sentence is easy to keep.' }),
      z.maxLength(PASSWORD_MAX, { error: 'Use at most 256 characters.' }),
    ),
});

export const sessionApi = {
  /** The signed-in user, or null. Never 401, so that the client can ask first. */
  current: endpoint({ method: 'GET', path: '/api/session', access: 'anyone', response: z.nullable(sessionView) }),
  signIn: endpoint({ method: 'POST', path: '/api/session', access: 'anyone', body: signInBody, response: sessionView }),
  signOut: endpoint({ method: 'DELETE', path: '/api/session', access: 'signedIn' }),
  signUp: endpoint({ method: 'POST', path: '/api/users', access: 'anyone', body: signUpBody, response: sessionView }),
};
