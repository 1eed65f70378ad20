import { queryOptions } from '@tanstack/react-query';
import { positionApi } from '#shared/api/position.ts';
import { call } from '#src/lib/api.ts';

export const positionQuery = (householdId: string) =>
  queryOptions({
    queryKey: ['household', householdId, 'position'],
    queryFn: ({ signal }) => call(positionApi.view, { params: { householdId }, signal }),
  });
