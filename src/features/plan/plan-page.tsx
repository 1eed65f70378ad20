import { useQuery } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import type { SetupView } from '#shared/api/setup.ts';
import { fullDate } from '#src/lib/format.ts';
import { useHousehold } from '#src/lib/household.ts';
import { Button } from '#src/ui/button.tsx';
import { emptyEntry, entryOf, type PlanEntry } from '#src/ui/plan-form/plan-entry.ts';
import { Sentence } from '#src/ui/sentence.tsx';
import { EmptyState, ErrorState, PageSkeleton } from '#src/ui/states.tsx';
import { PlanEditor } from './plan-editor.tsx';
import { plansQuery } from './plan-queries.ts';
import { PlanTimeline } from './plan-timeline.tsx';
import { TakeInPlan } from './take-in-plan.tsx';
import { currentPlan, planLabel } from './timeline.ts';
import { TrialSheet } from './trial-sheet.tsx';

/** Rate plan: what the house pays for energy and since when, an example month, and a trial of another plan. */
export function PlanPage() {
  const { id } = useHousehold();
  const setup = useQuery(plansQuery(id));
  if (setup.isPending) return <PageSkeleton />;
  if (setup.isError) return <ErrorState error={setup.error} retry={() => setup.refetch()} />;
  return <Plans view={setup.data} />;
}

/** The plan open in the editor: one of the list, or a new one that begins with what was copied or taken in. */
type Open = { index: number | null; start: PlanEntry; key: number };

function Plans({ view }: { view: SetupView }) {
  const { canEdit } = useHousehold();
  const [open, setOpen] = useState<Open | null>(null);
  const [keys, setKeys] = useState(0);
  const show = (index: number | null, start: PlanEntry) => {
    setKeys(keys + 1);
    setOpen({ index, start, key: keys });
  };
  const { switchOn, timeZone } = view.house;
  const today = dayNow(timeZone);
  const current = currentPlan(view.plans, today);
  const later = view.plans.filter(({ from }) => from > today && from !== current?.from);
  const close = () => setOpen(null);
  useEffect(() => {
    if (open) document.getElementById('plan-editor')?.scrollIntoView();
  }, [open]);
  const addLater = () => {
    // A later plan is mostly the one before it with a few things changed.
    const last = view.plans.at(-1);
    const start = last ? { ...entryOf(last), from: '' } : emptyEntry(switchOn ?? '');
    show(null, start);
  };
  return (
    <div className="page">
      <Sentence
        title="Rate plan"
        lede="How your utility settles what you buy and what you send out, in the order of its rate sheet."
      >
        {current ? (
          <>
            You are on <b>{current.plan.name || 'a rate plan without a name'}</b>{' '}
            {current.from > today ? 'from' : 'since'} {fullDate(current.from)}.
            {later.map((one) => ` ${planLabel(one)}, is to follow.`)}
          </>
        ) : (
          <b>No rate plan yet.</b>
        )}
      </Sentence>
      {current ? (
        <PlanTimeline
          view={view}
          today={today}
          edit={(index) => {
            const one = view.plans[index];
            if (one) show(index, entryOf(one));
          }}
          addLater={addLater}
          takeIn={(start) => show(null, start)}
        />
      ) : (
        !open && (
          <EmptyState
            title="Have the rate sheet or a statement beside you"
            action={
              canEdit && (
                <>
                  <Button onClick={addLater}>Enter the plan</Button>
                  <TakeInPlan from={switchOn ?? ''} take={(start) => show(null, start)} />
                </>
              )
            }
          >
            <p>
              With the plan, every bill is settled again from your meters and held against what was billed. The
              questions follow the sheet; a month is worked beside them as you type.
            </p>
          </EmptyState>
        )
      )}
      <div id="plan-editor">
        {open ? (
          <PlanEditor key={open.key} view={view} start={open.start} index={open.index} done={close} />
        ) : (
          current && <TrialSheet plans={view.plans} edited={null} />
        )}
      </div>
    </div>
  );
}

/** Today as a civil day of the house. */
function dayNow(timeZone: string): string {
  return new Intl.DateTimeFormat('en-CA', { timeZone, year: 'numeric', month: '2-digit', day: '2-digit' }).format();
}
