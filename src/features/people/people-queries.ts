import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { Role } from '#shared/api/endpoint.ts';
import { peopleApi } from '#shared/api/people.ts';
import { call } from '#src/lib/api.ts';

export function peopleQuery(householdId: string) {
  return queryOptions({
    queryKey: ['household', householdId, 'people'],
    queryFn: ({ signal }) => call(peopleApi.list, { params: { householdId }, signal }),
  });
}

export function useAddPerson(householdId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: { name: string; email: string; role: Role; password: string }) =>
      call(peopleApi.add, { params: { householdId }, body }),
    onSuccess: () => client.invalidateQueries({ queryKey: peopleQuery(householdId).queryKey }),
  });
}

export function useRemovePerson(householdId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (userId: string) => call(peopleApi.remove, { params: { householdId, userId } }),
    onSuccess: () => client.invalidateQueries({ queryKey: peopleQuery(householdId).queryKey }),
  });
}
