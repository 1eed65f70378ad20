import type { PositionView } from '#shared/api/position.ts';
import type { HouseholdContext } from '#src/lib/household.ts';
import { ButtonLink } from '#src/ui/button.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { EmptyState } from '#src/ui/states.tsx';
import { NeedsList } from './needs-list.tsx';

/** The screen before the first cycle: what it will say, and what to do for that. */
export function FirstUse({ view, household }: { view: PositionView; household: HouseholdContext }) {
  const base = `/h/${household.id}`;
  if (!household.canEdit) {
    return (
      <div className="page">
        <Sentence title="Position" lede={`${view.householdName} has no billing cycle yet.`}>
          <b>Nothing is posted yet.</b>
        </Sentence>
        <EmptyState title="What will stand here">
          Whether the roof is paying for itself, as one figure that can be proved line by line. The owner has not posted
          the first month yet; nothing is asked of you.
        </EmptyState>
      </div>
    );
  }
  const unfinished = view.unfinishedSteps;
  return (
    <div className="page">
      <Sentence
        title="Position"
        lede="Two things make the first figure: what the roof cost, and one month’s statement."
      >
        <b>Is the roof paying for itself?</b> The first month will say.
      </Sentence>
      <EmptyState
        title="What stands here"
        action={
          <>
            {unfinished.length > 0 && (
              <ButtonLink to={`${base}/setup/${unfinished[0]}`}>
                {unfinished.length >= 9 ? 'Start the set-up' : 'Go on with the set-up'}
              </ButtonLink>
            )}
            <ButtonLink to={`${base}/log`} look={unfinished.length > 0 ? 'plain' : 'main'}>
              Log the first month
            </ButtonLink>
          </>
        }
      >
        <p>
          An account book for the roof: what it keeps off the bill, what it earns, what the loan and the upkeep cost,
          and the day these come even. Every figure opens to the statement and the reading it came from.
        </p>
        <p className="mt-3">
          The set-up asks for the rate plan, the loan and the tax credit; any step can wait. Then log the oldest
          statement you have, or several at once.
        </p>
      </EmptyState>
      {view.needs.length > 0 && (
        <div className="mt-8 max-w-xl">
          <NeedsList needs={view.needs} unfinished={[]} base={base} />
        </div>
      )}
    </div>
  );
}
