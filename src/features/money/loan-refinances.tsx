import { useState } from 'react';
import { fullDate, money } from '#src/lib/format.ts';
import { percentWords } from '#src/lib/typed-values.ts';
import { Button } from '#src/ui/button.tsx';
import { Field } from '#src/ui/field.tsx';
import { MoneyFigure } from '#src/ui/figure.tsx';
import { SaveDialog } from '#src/ui/save-dialog.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { LoanLine, LoanList, LoanRemove } from './loan-list.tsx';
import type { LoanProps } from './loan-props.ts';
import { type RefinanceBody, useLoanChange } from './loan-queries.ts';
import { type RefinanceValues, readRefinance } from './loan-values.ts';
import { PaperField } from './paper-field.tsx';
import { PaperLink } from './paper-link.tsx';

/** New loans that paid the one before them off. */
export function LoanRefinances({ loan, householdId, canEdit, today }: LoanProps) {
  const [adding, setAdding] = useState(false);
  return (
    <Sheet
      title="Refinance"
      hint="A new loan that paid this one off, with its accrued interest and the contract’s fee."
    >
      <LoanList empty="None entered.">
        {loan.facts.refinances.map((one) => {
          const worked = loan.refinances.find(({ id }) => id === one.id);
          return (
            <LoanLine
              key={one.id}
              amount={money(one.principalCents)}
              remove={
                canEdit && (
                  <LoanRemove
                    what={`the refinance of ${fullDate(one.on)}`}
                    householdId={householdId}
                    change={{ kind: 'removeRefinance', id: one.id }}
                  />
                )
              }
            >
              {fullDate(one.on)}, {one.lender === '' ? 'a new lender' : one.lender}{' '}
              <span className="hint block">
                {percentWords(one.annualRate)} over {one.termMonths} months
                {worked && (
                  <>
                    ; paid off{' '}
                    <MoneyFigure
                      title={`Payoff of the loan before, ${fullDate(one.on)}`}
                      cents={worked.payoff.amountCents}
                      working={worked.payoff.working}
                    />
                    , in cash{' '}
                    <MoneyFigure
                      title={`Cash of the refinance, ${fullDate(one.on)}`}
                      cents={worked.cash.amountCents}
                      working={worked.cash.working}
                    />
                  </>
                )}
              </span>
              <PaperLink householdId={householdId} documentId={one.documentId} />
            </LoanLine>
          );
        })}
      </LoanList>
      {canEdit && (
        <p className="no-print mt-4">
          <Button look="plain" onClick={() => setAdding(true)}>
            Enter a refinance
          </Button>
        </p>
      )}
      {adding && <RefinanceDialog householdId={householdId} today={today} onClose={() => setAdding(false)} />}
    </Sheet>
  );
}

const NONE: RefinanceValues = {
  on: '',
  lender: '',
  principalCents: '',
  annualRate: '',
  termMonths: '',
  firstPaymentOn: '',
  costsCents: '',
  documentId: '',
};

function RefinanceDialog({ householdId, today, onClose }: { householdId: string; today: string; onClose: () => void }) {
  const change = useLoanChange(householdId);
  return (
    <SaveDialog<RefinanceValues, RefinanceBody>
      title="Enter a refinance"
      hint="What the new loan lends beyond the payoff was paid out to you; what it lacks you paid in cash."
      defaults={{ ...NONE, on: today }}
      read={readRefinance}
      save={(body) => change.mutateAsync({ kind: 'addRefinance', body })}
      onClose={onClose}
    >
      {({ register, watch, setValue, formState: { errors } }) => (
        <>
          <Field
            label="Funded on"
            type="date"
            error={errors.on?.message}
            {...register('on', { deps: ['firstPaymentOn'] })}
          />
          <Field label="Lender" maxLength={120} error={errors.lender?.message} {...register('lender')} />
          <Field
            label="Principal"
            unit="$"
            inputMode="decimal"
            error={errors.principalCents?.message}
            {...register('principalCents')}
          />
          <div className="grid gap-x-6 sm:grid-cols-2">
            <Field
              label="Rate a year"
              unit="%"
              inputMode="decimal"
              error={errors.annualRate?.message}
              {...register('annualRate')}
            />
            <Field
              label="Term"
              unit="months"
              inputMode="numeric"
              error={errors.termMonths?.message}
              {...register('termMonths')}
            />
          </div>
          <Field
            label="First payment on"
            type="date"
            error={errors.firstPaymentOn?.message}
            {...register('firstPaymentOn')}
          />
          <Field
            label="Costs paid in cash"
            hint="Leave empty for none; what was financed is inside the principal."
            unit="$"
            inputMode="decimal"
            error={errors.costsCents?.message}
            {...register('costsCents')}
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
