import { useQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import { useHousehold } from '#src/lib/household.ts';
import { ButtonLink } from '#src/ui/button.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { EmptyState, ErrorState, PageSkeleton } from '#src/ui/states.tsx';
import { TryDesk } from './try-desk.tsx';
import { tryQuery } from './try-queries.ts';

/** Try a change: what would it do to the position, without touching the record? */
export function TryPage() {
  const household = useHousehold();
  const view = useQuery(tryQuery(household.id));
  const { basis, hourly } = view.data ?? { basis: null, hourly: null };
  const tryBasis = useMemo(() => (basis && hourly ? { basis, hourly } : null), [basis, hourly]);
  if (view.isPending) return <PageSkeleton />;
  if (view.isError) return <ErrorState error={view.error} retry={() => view.refetch()} />;
  if (tryBasis === null) return <NothingYet why={view.data.why} />;
  return <TryDesk key={household.id} household={household} tryBasis={tryBasis} scenarios={view.data.scenarios} />;
}

function NothingYet({ why }: { why: string | null }) {
  const { id, canEdit } = useHousehold();
  const base = `/h/${id}`;
  return (
    <div className="page">
      <Sentence title="Try a change">There is nothing to try a change on yet.</Sentence>
      <EmptyState
        title="A projection comes first"
        action={
          canEdit && (
            <>
              <ButtonLink to={`${base}/log`}>Log this month</ButtonLink>
              <ButtonLink to={`${base}/setup/plan`} look="plain">
                Enter the rate plan
              </ButtonLink>
            </>
          )
        }
      >
        {why ?? 'Post the first cycle to see a projection.'} Then you can see here what paying the loan down, a cut of
        the export credit or a car to charge would do.
      </EmptyState>
    </div>
  );
}
