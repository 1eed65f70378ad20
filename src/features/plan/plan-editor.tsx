import { useQuery } from '@tanstack/react-query';
import { useEffect, useMemo, useState } from 'react';
import type { ExampleView } from '#shared/api/plan.ts';
import type { SetupView } from '#shared/api/setup.ts';
import { refusalLines } from '#src/lib/form.ts';
import { useHousehold } from '#src/lib/household.ts';
import { Button } from '#src/ui/button.tsx';
import { ErrorSummary } from '#src/ui/field.tsx';
import { entryFaults, type PlanEntry, planOfEntry } from '#src/ui/plan-form/plan-entry.ts';
import { PlanEntryFields } from '#src/ui/plan-form/plan-entry-fields.tsx';
import { textSoFar } from '#src/ui/plan-form/plan-text.ts';
import { Sheet } from '#src/ui/sheet.tsx';
import { ExampleAside } from './example-aside.tsx';
import { exampleQuery, useSavePlans } from './plan-queries.ts';
import { planLabel } from './timeline.ts';
import { TrialSheet } from './trial-sheet.tsx';
import { useDebounced } from './use-debounced.ts';

const WAIT = 350;

/** A plan being written, its example month beside it, and its trial below. `index` is null for a new one. */
export function PlanEditor({
  view,
  start,
  index,
  done,
}: {
  view: SetupView;
  start: PlanEntry;
  index: number | null;
  done: () => void;
}) {
  const { id, canEdit } = useHousehold();
  const [entry, setEntry] = useState(start);
  const [tried, setTried] = useState(false);
  const [to, setTo] = useState<string | null>(null);
  const save = useSavePlans(id);
  const { timeZone } = view.house;
  const others = useMemo(
    () =>
      view.plans.flatMap((one, at) =>
        at === index ? [] : [{ label: planLabel(one), from: one.from, plan: one.plan }],
      ),
    [view.plans, index],
  );
  const faults = useMemo(
    () =>
      entryFaults(
        entry,
        others.map(({ from }) => from),
      ),
    [entry, others],
  );
  const plan = useMemo(() => textSoFar(entry, timeZone), [entry, timeZone]);
  const other = useMemo(
    () => (entry.withoutRoof === 'other' && entry.other ? textSoFar(entry.other, timeZone) : null),
    [entry, timeZone],
  );
  const reads = faults.length === 0;
  const example = useQuery({ ...exampleQuery(id, useStillText(plan), to), enabled: reads });
  const without = useQuery({ ...exampleQuery(id, useStillText(other), to), enabled: reads && other !== null });
  const periods = useMemo(() => new Map(entry.form.periods.map((one) => [one.id, one.label])), [entry.form.periods]);

  // What was typed is not lost by closing the window unasked.
  const changed = entry !== start && canEdit;
  useEffect(() => {
    if (!changed) return;
    const ask = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener('beforeunload', ask);
    return () => window.removeEventListener('beforeunload', ask);
  }, [changed]);

  const submit = () => {
    setTried(true);
    if (faults.length > 0) return;
    const made = planOfEntry(entry, timeZone);
    const plans = index === null ? [...view.plans, made] : view.plans.map((one, at) => (at === index ? made : one));
    plans.sort((a, b) => (a.from < b.from ? -1 : 1));
    save.mutate({ plans, opening: view.opening }, { onSuccess: done });
  };
  const wrong = tried
    ? faults.map(({ path, message }) => ({
        text: message,
        pick: () => document.getElementsByName(`plan.${path}`)[0]?.focus(),
      }))
    : [];
  return (
    <>
      <Sheet title={index === null ? 'A new plan' : canEdit ? 'Edit this plan' : 'This plan'}>
        <div className="grid gap-x-10 gap-y-8 lg:grid-cols-[minmax(0,1fr)_340px]">
          <form
            noValidate
            onSubmit={(event) => {
              event.preventDefault();
              submit();
            }}
          >
            <ErrorSummary
              title="Not saved yet"
              errors={[...unique(wrong), ...(save.isError ? refusalLines(save.error) : [])]}
            />
            <fieldset disabled={!canEdit} className="min-w-0 [&:disabled_button]:hidden">
              <PlanEntryFields
                entry={entry}
                onChange={setEntry}
                timeZone={timeZone}
                refused={refusedIn(example.data)}
                refusedWithoutRoof={other === null ? [] : refusedIn(without.data)}
                others={others}
                showAll={tried}
                prefix="plan"
              />
            </fieldset>
            <p className="mt-7 flex flex-wrap items-center gap-x-5 gap-y-3">
              {canEdit && (
                <Button type="submit" busy={save.isPending}>
                  Save this plan
                </Button>
              )}
              <Button look="plain" onClick={done}>
                {canEdit ? 'Leave it as it was' : 'Close'}
              </Button>
            </p>
          </form>
          <ExampleAside
            view={example.data ?? null}
            missing={faults.length}
            busy={example.isFetching}
            to={to}
            choose={setTo}
            periods={periods}
          />
        </div>
      </Sheet>
      <TrialSheet plans={view.plans} edited={faults.length === 0 ? plan : null} />
    </>
  );
}

/** A plan as text once it has stood still for a while. */
function useStillText(plan: unknown): string {
  return useDebounced(
    useMemo(() => JSON.stringify(plan), [plan]),
    WAIT,
  );
}

function refusedIn(example: ExampleView | undefined): { path: string; message: string }[] {
  return (example?.faults ?? []).map(({ field, message }) => ({ path: field ?? '', message }));
}

function unique<T extends { text: string }>(errors: T[]): T[] {
  return errors.filter((one, at) => errors.findIndex(({ text }) => text === one.text) === at);
}
