import { dayCount, type LoanFacts, loanSecurity } from '#shared/facts/finance.ts';
import { Field, SelectField } from '#src/ui/field.tsx';
import { SaveDialog } from '#src/ui/save-dialog.tsx';
import { type ContractBody, useLoanChange } from './loan-queries.ts';
import { type ContractValues, contractValues, readContract } from './loan-values.ts';
import { DAY_COUNTS, SECURITIES } from './loan-words.ts';

/** How days are counted, a promotion, a prepayment taken for granted, the fee of a payoff, how the loan is secured. */
export function LoanContractDialog({
  facts,
  householdId,
  onClose,
}: {
  facts: LoanFacts;
  householdId: string;
  onClose: () => void;
}) {
  const change = useLoanChange(householdId);
  return (
    <SaveDialog<ContractValues, ContractBody>
      title="Your contract"
      hint="As the loan’s papers say it. Principal, rate and term are in the set-up."
      defaults={contractValues(facts)}
      read={readContract}
      save={(body) => change.mutateAsync({ kind: 'contract', body })}
      onClose={onClose}
    >
      {({ register, watch, formState: { errors } }) => (
        <>
          <SelectField
            label="Interest is counted"
            hint="A simple-interest loan counts the days that pass; many schedules are drawn up by months."
            error={errors.dayCount?.message}
            {...register('dayCount')}
          >
            {dayCount.options.map((one) => (
              <option key={one} value={one}>
                {DAY_COUNTS[one]}
              </option>
            ))}
          </SelectField>
          <SelectField
            label="Promotional period"
            error={errors.promotion?.payment?.message}
            {...register('promotion.payment')}
          >
            <option value="no">none</option>
            <option value="level">level payments at a rate of their own</option>
            <option value="interest">interest alone</option>
            <option value="none">no payments, interest added at the end</option>
          </SelectField>
          {watch('promotion.payment') !== 'no' && (
            <div className="grid gap-x-6 sm:grid-cols-2">
              <Field
                label="Its length"
                unit="months"
                inputMode="numeric"
                error={errors.promotion?.months?.message}
                {...register('promotion.months')}
              />
              <Field
                label="Its rate a year"
                unit="%"
                inputMode="decimal"
                error={errors.promotion?.annualRate?.message}
                {...register('promotion.annualRate')}
              />
            </div>
          )}
          <SelectField
            label="A prepayment is taken for granted"
            hint="Many solar loans set the payment as if the tax credit were paid in, and raise it if it is not."
            error={errors.assumedPrepayment?.is?.message}
            {...register('assumedPrepayment.is')}
          >
            <option value="no">no, the payment clears the loan by itself</option>
            <option value="yes">yes</option>
          </SelectField>
          {watch('assumedPrepayment.is') === 'yes' && (
            <div className="grid gap-x-6 sm:grid-cols-2">
              <Field
                label="How much"
                unit="$"
                inputMode="decimal"
                error={errors.assumedPrepayment?.amountCents?.message}
                {...register('assumedPrepayment.amountCents')}
              />
              <Field
                label="By payment number"
                inputMode="numeric"
                error={errors.assumedPrepayment?.byPayment?.message}
                {...register('assumedPrepayment.byPayment')}
              />
            </div>
          )}
          <Field
            label="Fee for a payoff"
            hint="Leave empty for none."
            unit="$"
            inputMode="decimal"
            error={errors.payoffFeeCents?.message}
            {...register('payoffFeeCents')}
          />
          <SelectField
            label="Secured"
            hint="The papers name a filing or a mortgage. What it means for your home is for the servicer and counsel to say."
            error={errors.security?.message}
            {...register('security')}
          >
            {loanSecurity.options.map((one) => (
              <option key={one} value={one}>
                {SECURITIES[one]}
              </option>
            ))}
          </SelectField>
        </>
      )}
    </SaveDialog>
  );
}
