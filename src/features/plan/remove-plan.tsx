import { useQuery } from '@tanstack/react-query';
import type { SetupView } from '#shared/api/setup.ts';
import type { PlanInForce } from '#shared/facts/household.ts';
import { cycleRangeWithYear } from '#src/lib/format.ts';
import { useHousehold } from '#src/lib/household.ts';
import { Button } from '#src/ui/button.tsx';
import { Dialog } from '#src/ui/dialog.tsx';
import { cyclesQuery, type useSavePlans } from './plan-queries.ts';
import { planLabel, resettledWithout } from './timeline.ts';

/** Asks before a plan is removed, and says first which cycles it settles and what they would be settled on instead. */
export function RemovePlan({
  view,
  index,
  save,
  onClose,
}: {
  view: SetupView;
  index: number;
  save: ReturnType<typeof useSavePlans>;
  onClose: () => void;
}) {
  const { id } = useHousehold();
  const cycles = useQuery(cyclesQuery(id));
  const leaving = view.plans[index];
  if (!leaving) return null;
  const moved = cycles.data ? resettledWithout(view.plans, index, cycles.data.rows) : null;
  return (
    <Dialog title={`Remove ${leaving.plan.name || 'this plan'}?`} onClose={onClose}>
      <div aria-live="polite">
        {moved === null && <p className="mt-3">{cycles.isError ? RULE : 'Looking up the cycles it settles.'}</p>}
        {moved?.length === 0 && <p className="mt-3">No cycle is settled on it, so nothing else changes.</p>}
        {moved?.map(({ on, cycles: held }) => (
          <p key={on?.from ?? 'none'} className="mt-3">
            {movedSentence(on, held)}
          </p>
        ))}
      </div>
      <p className="mt-3">Statements and readings stay.</p>
      <p className="mt-5">
        <Button
          busy={save.isPending}
          onClick={() =>
            save.mutate(
              { plans: view.plans.filter((_, at) => at !== index), opening: view.opening },
              { onSettled: onClose },
            )
          }
        >
          Remove it
        </Button>
      </p>
    </Dialog>
  );
}

const RULE = 'Cycles that began under it are settled on the plan before it, or on the first one left.';

/** "The 3 cycles from 16 June to 15 September 2026 are settled again on R-1, from 1 January 2025." */
export function movedSentence(
  on: PlanInForce | null,
  cycles: ReturnType<typeof resettledWithout>[number]['cycles'],
): string {
  const [first] = cycles;
  const last = cycles.at(-1);
  if (!first || !last) return '';
  const which = cycles.length === 1 ? 'One cycle' : `${cycles.length} cycles`;
  const dates = cycleRangeWithYear(first.from, last.to);
  if (on === null)
    return `${which} (${dates}) can no longer be settled: without a plan, bills are not held against anything.`;
  return `${which} (${dates}) ${cycles.length === 1 ? 'is' : 'are'} settled again on ${planLabel(on)}.`;
}
