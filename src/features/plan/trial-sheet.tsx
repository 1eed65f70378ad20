import { useState } from 'react';
import type { PlanInForce } from '#shared/facts/household.ts';
import { refusalLines } from '#src/lib/form.ts';
import { useHousehold } from '#src/lib/household.ts';
import { Button } from '#src/ui/button.tsx';
import { ErrorSummary, SelectField, TextArea } from '#src/ui/field.tsx';
import { Columns } from '#src/ui/rows.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { useTrial } from './plan-queries.ts';
import { planLabel } from './timeline.ts';
import { TrialResult } from './trial-result.tsx';

const PASTED = 'pasted';
const EDITED = 'edited';

/** "What would last year have cost on this plan?" `edited` is the plan being written above, null where there is none or it is not complete. */
export function TrialSheet({ plans, edited }: { plans: readonly PlanInForce[]; edited: unknown }) {
  const { id } = useHousehold();
  const trial = useTrial(id);
  const [chosen, setChosen] = useState<string | null>(null);
  const [cycles, setCycles] = useState<'year' | 'all'>('year');
  const [text, setText] = useState('');
  const [unread, setUnread] = useState<string | null>(null);
  const which = chosen ?? (edited ? EDITED : PASTED);
  const run = () => {
    setUnread(null);
    const plan = planChosen(which, plans, edited, text);
    if (plan === null) {
      setUnread(
        which === EDITED ? 'Fill in the plan above first.' : 'This is not JSON. Paste a whole plan, from { to }.',
      );
      return;
    }
    trial.mutate({ plan, cycles });
  };
  return (
    <Sheet
      title="What would last year have cost on this plan?"
      hint="Your own cycles, settled on another plan. Nothing is changed by it. Credit begins at nothing on the first of them."
    >
      <ErrorSummary title="Not tried" errors={trial.isError ? refusalLines(trial.error) : []} />
      <Columns>
        <SelectField label="The plan to try" value={which} onChange={(event) => setChosen(event.target.value)}>
          {edited !== null && <option value={EDITED}>the plan being written above</option>}
          {plans.map((one, index) => (
            <option key={one.from} value={String(index)}>
              {planLabel(one)}
            </option>
          ))}
          <option value={PASTED}>a plan I paste here</option>
        </SelectField>
        <SelectField
          label="On"
          value={cycles}
          onChange={(event) => setCycles(event.target.value === 'all' ? 'all' : 'year')}
        >
          <option value="year">the last 12 cycles</option>
          <option value="all">all cycles</option>
        </SelectField>
      </Columns>
      {which === PASTED && (
        <TextArea
          label="The plan as JSON"
          rows={5}
          spellCheck={false}
          error={unread ?? undefined}
          value={text}
          onChange={(event) => setText(event.target.value)}
        />
      )}
      {which !== PASTED && unread && <p className="field-error mt-3">{unread}</p>}
      <p className="mt-5">
        <Button busy={trial.isPending} onClick={run}>
          Try it
        </Button>
      </p>
      {trial.data && <TrialResult view={trial.data} />}
    </Sheet>
  );
}

function planChosen(which: string, plans: readonly PlanInForce[], edited: unknown, text: string): unknown {
  if (which === EDITED) return edited;
  if (which !== PASTED) return plans[Number(which)]?.plan ?? null;
  try {
    const value: unknown = JSON.parse(text);
    return typeof value === 'object' && value !== null && 'plan' in value ? value.plan : value;
  } catch {
    return null;
  }
}
