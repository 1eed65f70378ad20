import * as z from 'zod/mini';
import { endpoint, OWNER } from './endpoint.ts';
import { emailSchema, PASSWORD_MAX, PASSWORD_MIN, personName, roleSchema } from './session.ts';

export const personView = z.object({
  userId: z.string(),
  name: z.string(),
  email: z.string(),
  role: roleSchema,
  since: z.string(),
  you: z.boolean(),
});
export type PersonView = z.infer<typeof personView>;

const newPassword = z
  .string()
  .check(
    z.minLength(PASSWORD_MIN, { error: 'Use 15 characters or more; a short sentence is easy to keep.' }),
    z.maxLength(PASSWORD_MAX, { error: 'Use at most 256 characters.' }),
  );

export const addPersonBody = z.strictObject({
  name: personName,
  email: emailSchema,
  role: roleSchema,
  password: newPassword,
});
export const changePasswordBody = z.strictObject({ current: z.string().check(z.maxLength(1024)), next: newPassword });

export const peopleApi = {
  list: endpoint({
    method: 'GET',
    path: '/api/households/:householdId/people',
    access: OWNER,
    response: z.array(personView),
  }),
  /** Adds a person directly: a new user with this first password, to be told in person. A user who exists already answers `email-taken`. */
  add: endpoint({
    method: 'POST',
    path: '/api/households/:householdId/people',
    access: OWNER,
    body: addPersonBody,
    response: personView,
  }),
  /** Takes a person's access away at once. The last owner cannot be removed (`conflict`). */
  remove: endpoint({ method: 'DELETE', path: '/api/households/:householdId/people/:userId', access: OWNER }),
  /** Ends every other session of the user. */
  changePassword: endpoint({
    method: 'PUT',
    path: '/api/account/password',
    access: 'signedIn',
    body: changePasswordBody,
  }),
  /** The full household export (`shared/facts/household.ts`), as a JSON download. */
  exportHousehold: endpoint({
    method: 'GET',
    path: '/api/households/:householdId/export',
    access: OWNER,
    kind: 'download',
  }),
};
