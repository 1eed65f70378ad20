import type { Role } from '#shared/api/endpoint.ts';

/** What each role may do, in a line. */
export const ROLES: Record<Role, { name: string; may: string }> = {
  owner: {
    name: 'Owner',
    may: 'Sees and changes everything: logs months, states the house, adds and removes people. There may be several, all equal.',
  },
  member: {
    name: 'Household member',
    may: 'Sees the position, cycles, money, tax credit and set-up; changes nothing.',
  },
  preparer: {
    name: 'Tax preparer',
    may: 'Sees the tax credit, the papers behind it and its summary; nothing else.',
  },
};
