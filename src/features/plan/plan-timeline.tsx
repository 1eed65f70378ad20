import { useState } from 'react';
import type { SetupView } from '#shared/api/setup.ts';
import { saveText } from '#src/lib/csv.ts';
import { refusalLines } from '#src/lib/form.ts';
import { fullDate } from '#src/lib/format.ts';
import { useHousehold } from '#src/lib/household.ts';
import { Button } from '#src/ui/button.tsx';
import { ErrorSummary } from '#src/ui/field.tsx';
import type { PlanEntry } from '#src/ui/plan-form/plan-entry.ts';
import { Sheet } from '#src/ui/sheet.tsx';
import { planFileName, planText } from './plan-file.ts';
import { useSavePlans } from './plan-queries.ts';
import { RemovePlan } from './remove-plan.tsx';
import { TakeInPlan } from './take-in-plan.tsx';
import { timelineOf } from './timeline.ts';

/** Plans and prices by date: from when, and what changed. */
export function PlanTimeline({
  view,
  today,
  edit,
  addLater,
  takeIn,
}: {
  view: SetupView;
  today: string;
  edit: (index: number) => void;
  addLater: () => void;
  takeIn: (start: PlanEntry) => void;
}) {
  const { id, canEdit } = useHousehold();
  const save = useSavePlans(id);
  const [removing, setRemoving] = useState<number | null>(null);
  return (
    <Sheet title="Plans and prices by date" hint="New prices stand inside a plan. Other rules are a plan of their own.">
      <ErrorSummary title="Not removed" errors={save.isError ? refusalLines(save.error) : []} />
      <table className="ruled ruled-stack">
        <caption className="visually-hidden">Plans and price versions by date</caption>
        <thead>
          <tr>
            <th scope="col">From</th>
            <th scope="col" className="text">
              What changed
            </th>
            <td />
          </tr>
        </thead>
        <tbody>
          {timelineOf(view.plans).map((row) => {
            const one = view.plans[row.index];
            return (
              <tr key={row.key}>
                <th scope="row" className="whitespace-nowrap">
                  {fullDate(row.from)}
                </th>
                <td className="text" data-label="What changed">
                  <span className="min-w-0 [overflow-wrap:anywhere]">
                    {row.kind === 'plan' ? <b>{row.title}</b> : row.title}
                    {row.from > today && <span className="hint"> begins later</span>}
                    {row.changes.map((change) => (
                      <span key={change} className="hint block">
                        {change}
                      </span>
                    ))}
                  </span>
                </td>
                <td>
                  {row.kind === 'plan' && one && (
                    <span className="flex flex-wrap justify-end gap-x-5">
                      <button type="button" className="link min-h-11" onClick={() => edit(row.index)}>
                        {canEdit ? 'Edit' : 'Look'}
                        <span className="visually-hidden"> {row.title}</span>
                      </button>
                      <button
                        type="button"
                        className="link min-h-11"
                        onClick={() => saveText(planFileName(one.plan, one.from), planText(one), 'application/json')}
                      >
                        Save as JSON
                        <span className="visually-hidden">, {row.title}</span>
                      </button>
                      {canEdit && (
                        <button type="button" className="link min-h-11" onClick={() => setRemoving(row.index)}>
                          Remove
                          <span className="visually-hidden"> {row.title}</span>
                        </button>
                      )}
                    </span>
                  )}
                </td>
              </tr>
            );
          })}
        </tbody>
      </table>
      {canEdit && (
        <p className="mt-5 flex flex-wrap gap-3">
          <Button look="plain" onClick={addLater}>
            Add a plan that starts later
          </Button>
          <TakeInPlan from="" take={takeIn} />
        </p>
      )}
      {removing !== null && <RemovePlan view={view} index={removing} save={save} onClose={() => setRemoving(null)} />}
    </Sheet>
  );
}
