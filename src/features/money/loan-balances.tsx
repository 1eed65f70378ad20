import { useState } from 'react';
import { cents } from '#shared/units/cents.ts';
import { fullDate, money } from '#src/lib/format.ts';
import { Button } from '#src/ui/button.tsx';
import { Field } from '#src/ui/field.tsx';
import { MoneyFigure } from '#src/ui/figure.tsx';
import { SaveDialog } from '#src/ui/save-dialog.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { LoanRemove } from './loan-list.tsx';
import type { LoanProps } from './loan-props.ts';
import { type LoanBalanceBody, useLoanChange } from './loan-queries.ts';
import { type LoanBalanceValues, readLoanBalance } from './loan-values.ts';
import { PaperField } from './paper-field.tsx';
import { PaperLink } from './paper-link.tsx';

/** What the lender's statements say is owed, each beside this schedule's own balance of the day. */
export function LoanBalances({ loan, householdId, canEdit, today }: LoanProps) {
  const [adding, setAdding] = useState(false);
  return (
    <Sheet
      title="Balances by the lender"
      hint="From its day on a statement’s principal stands in the place of ours. No money moves by it; what is left to pay follows the lender."
    >
      {loan.balances.length === 0 ? (
        <p className="border-t-2 border-b border-t-ink border-b-rule py-2 text-soft">
          None entered; the balance is computed.
        </p>
      ) : (
        <table className="ruled ruled-stack ruled-tight">
          <thead>
            <tr>
              <th scope="col">Close of</th>
              <th scope="col">By the lender</th>
              <th scope="col">By the schedule</th>
              <th scope="col">Lender less ours</th>
              {canEdit && (
                <th scope="col" className="no-print">
                  <span className="visually-hidden">Take back</span>
                </th>
              )}
            </tr>
          </thead>
          <tbody>
            {[...loan.balances].reverse().map((row) => (
              <tr key={row.id}>
                <th scope="row">
                  {fullDate(row.on)}{' '}
                  <PaperLink
                    householdId={householdId}
                    documentId={loan.facts.balances.find(({ id }) => id === row.id)?.documentId ?? null}
                  />
                </th>
                <td data-label="By the lender">{money(row.balanceCents)}</td>
                <td data-label="By the schedule">
                  <MoneyFigure
                    title={`Principal by the schedule, ${fullDate(row.on)}`}
                    cents={row.ours.amountCents}
                    working={row.ours.working}
                  />
                </td>
                <td data-label="Lender less ours">{money(cents(row.balanceCents - row.ours.amountCents))}</td>
                {canEdit && (
                  <td className="no-print">
                    <LoanRemove
                      what={`the balance of ${fullDate(row.on)}`}
                      householdId={householdId}
                      change={{ kind: 'removeBalance', id: row.id }}
                    />
                  </td>
                )}
              </tr>
            ))}
          </tbody>
        </table>
      )}
      {canEdit && (
        <p className="no-print mt-4">
          <Button look="plain" onClick={() => setAdding(true)}>
            Add a balance
          </Button>
        </p>
      )}
      {adding && <BalanceDialog householdId={householdId} today={today} onClose={() => setAdding(false)} />}
    </Sheet>
  );
}

function BalanceDialog({ householdId, today, onClose }: { householdId: string; today: string; onClose: () => void }) {
  const change = useLoanChange(householdId);
  return (
    <SaveDialog<LoanBalanceValues, LoanBalanceBody>
      title="Balance by the lender’s statement"
      hint="The principal alone, without interest or fees, at the close of the statement’s day."
      defaults={{ on: today, balanceCents: '', documentId: '' }}
      read={readLoanBalance}
      save={(body) => change.mutateAsync({ kind: 'addBalance', body })}
      onClose={onClose}
    >
      {({ register, watch, setValue, formState: { errors } }) => (
        <>
          <Field label="On" type="date" error={errors.on?.message} {...register('on')} />
          <Field
            label="Principal owed"
            unit="$"
            inputMode="decimal"
            error={errors.balanceCents?.message}
            {...register('balanceCents')}
          />
          <PaperField
            householdId={householdId}
            value={watch('documentId')}
            error={errors.documentId?.message}
            onChange={(id) => setValue('documentId', id, { shouldDirty: true })}
          />
        </>
      )}
    </SaveDialog>
  );
}
