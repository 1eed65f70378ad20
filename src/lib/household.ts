import { useOutletContext } from 'react-router-dom';
import type { Role } from '#shared/api/endpoint.ts';

/** The household the signed-in person is looking at, given by the shell to every screen under `/h/:householdId`. */
export type HouseholdContext = { id: string; name: string; role: Role; personName: string; canEdit: boolean };

export function useHousehold(): HouseholdContext {
  return useOutletContext<HouseholdContext>();
}
