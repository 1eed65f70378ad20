import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { parseDay } from '#shared/units/day.ts';
import { fullDate, money } from '#src/lib/format.ts';
import { errorWords } from '#src/lib/problem-words.ts';
import { Field } from '#src/ui/field.tsx';
import { MoneyFigure } from '#src/ui/figure.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { FactsList } from './facts-list.tsx';
import type { LoanProps } from './loan-props.ts';
import { payoffQuery } from './loan-queries.ts';

/** What it takes to pay the loan off on a day, past or to come. */
export function LoanPayoff({ loan, householdId, today }: LoanProps) {
  const [on, setOn] = useState(today);
  const picked = parseDay(on);
  const isEarly = picked !== null && picked < loan.facts.fundedOn;
  const asked = picked !== null && !isEarly;
  const view = useQuery({
    ...payoffQuery(householdId, picked ?? today),
    enabled: asked,
    placeholderData: keepPreviousData,
  });
  const fault = isEarly ? 'The loan was not funded yet on this day.' : 'Write a date that exists.';
  return (
    <Sheet
      title="Pay it off"
      hint="At the close of the day, its payments made to schedule. Ask the servicer for a quote; that one counts."
    >
      <Field
        label="On"
        type="date"
        value={on}
        min={loan.facts.fundedOn}
        error={asked ? undefined : fault}
        onChange={(event) => setOn(event.target.value)}
      />
      {view.isError && (
        <p role="alert" className="neg mt-3">
          {errorWords(view.error)}
        </p>
      )}
      {view.isPending && asked && <div className="bone mt-4 h-28" aria-busy="true" />}
      {view.data && asked && !view.isError && (
        <div aria-live="polite" className="mt-4" aria-busy={view.isPlaceholderData}>
          <FactsList
            rows={[
              { label: 'Principal', value: money(view.data.balanceCents) },
              {
                label: 'Interest due and accrued',
                hint: view.data.days > 0 ? `${view.data.days} days since it was last counted` : undefined,
                value: money(view.data.interestCents),
              },
              ...(view.data.feeCents > 0 ? [{ label: 'Fee for the payoff', value: money(view.data.feeCents) }] : []),
              {
                label: `Payoff on ${fullDate(view.data.on)}`,
                value: (
                  <MoneyFigure
                    title={`Payoff on ${fullDate(view.data.on)}`}
                    cents={view.data.payoff.amountCents}
                    working={view.data.payoff.working}
                  />
                ),
                total: true,
              },
            ]}
          />
        </div>
      )}
    </Sheet>
  );
}
