import { type ReactNode, useState } from 'react';
import { fullDate, money } from '#src/lib/format.ts';
import { errorWords } from '#src/lib/problem-words.ts';
import { Button } from '#src/ui/button.tsx';
import { Field, SelectField } from '#src/ui/field.tsx';
import { SaveDialog } from '#src/ui/save-dialog.tsx';
import type { InsuranceProps } from './insurance-props.ts';
import { type AppraisalBody, type BalanceBody, type MortgageChange, useMortgageChange } from './insurance-queries.ts';
import { type AppraisalValues, type BalanceValues, readAppraisal, readBalance } from './insurance-values.ts';
import { VALUE_KINDS } from './insurance-words.ts';
import { PaperField } from './paper-field.tsx';
import { PaperLink } from './paper-link.tsx';

/** What the home was said to be worth, newest first. */
export function InsuranceValues({ view, householdId, canEdit, today }: InsuranceProps) {
  const [adding, setAdding] = useState(false);
  const change = useMortgageChange(householdId);
  const rows = [...view.facts.appraisals].sort((a, b) => (a.on < b.on ? 1 : -1));
  return (
    <section className="min-w-0">
      <h3>What the home was said to be worth</h3>
      <Rows empty="No value is entered beside the original one.">
        {rows.map((row) => (
          <Row
            key={row.id}
            words={`${fullDate(row.on)}, ${VALUE_KINDS[row.how]}`}
            amount={money(row.valueCents)}
            paper={<PaperLink householdId={householdId} documentId={row.documentId} />}
            remove={
              canEdit && (
                <Remove
                  what={`the value of ${fullDate(row.on)}`}
                  householdId={householdId}
                  change={{ kind: 'removeAppraisal', id: row.id }}
                />
              )
            }
          />
        ))}
      </Rows>
      {canEdit && <Add words="Add a value" onClick={() => setAdding(true)} />}
      {adding && (
        <SaveDialog<AppraisalValues, AppraisalBody>
          title="What the home was said to be worth"
          hint="Your own estimate draws the line of loan-to-value; a servicer asks for an appraisal or a broker’s opinion."
          defaults={{ on: today, valueCents: '', how: 'appraisal', documentId: '' }}
          read={readAppraisal}
          save={(body) => change.mutateAsync({ kind: 'addAppraisal', body })}
          onClose={() => setAdding(false)}
        >
          {({ register, watch, setValue, formState: { errors } }) => (
            <>
              <Field label="On" type="date" error={errors.on?.message} {...register('on')} />
              <Field
                label="Value"
                unit="$"
                inputMode="decimal"
                error={errors.valueCents?.message}
                {...register('valueCents')}
              />
              <SelectField label="By" error={errors.how?.message} {...register('how')}>
                <option value="appraisal">an appraisal</option>
                <option value="brokerOpinion">a broker’s opinion</option>
                <option value="ownEstimate">your own estimate</option>
              </SelectField>
              <PaperField
                householdId={householdId}
                value={watch('documentId')}
                error={errors.documentId?.message}
                onChange={(id) => setValue('documentId', id, { shouldDirty: true })}
              />
            </>
          )}
        </SaveDialog>
      )}
    </section>
  );
}

/** What the lender's statements say is owed, newest first, each with how far it lies from the computed balance. */
export function InsuranceBalances({ view, householdId, canEdit, today }: InsuranceProps) {
  const [adding, setAdding] = useState(false);
  const change = useMortgageChange(householdId);
  const rows = [...view.facts.balances].sort((a, b) => (a.on < b.on ? 1 : -1));
  return (
    <section className="min-w-0">
      <h3>Balances by the lender’s statements</h3>
      <Rows empty="None entered; the balance is computed.">
        {rows.map((row) => (
          <Row
            key={row.id}
            words={`${fullDate(row.on)}${driftOf(view, row.on)}`}
            amount={money(row.balanceCents)}
            paper={<PaperLink householdId={householdId} documentId={row.documentId} />}
            remove={
              canEdit && (
                <Remove
                  what={`the balance of ${fullDate(row.on)}`}
                  householdId={householdId}
                  change={{ kind: 'removeBalance', id: row.id }}
                />
              )
            }
          />
        ))}
      </Rows>
      {canEdit && <Add words="Add a balance" onClick={() => setAdding(true)} />}
      {adding && (
        <SaveDialog<BalanceValues, BalanceBody>
          title="Balance by the lender’s statement"
          hint="From this day on it stands in the place of the computed balance. The dates by law keep to the initial schedule."
          defaults={{ on: today, balanceCents: '', documentId: '' }}
          read={readBalance}
          save={(body) => change.mutateAsync({ kind: 'addBalance', body })}
          onClose={() => setAdding(false)}
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
      )}
    </section>
  );
}

/** ", −$12.40 beside the computed balance" for the statement of a day; nothing where they are the same. */
function driftOf({ schedule }: InsuranceProps['view'], on: string): string {
  const row = schedule.findLast((one) => one.on <= on);
  return row?.stated && row.driftCents !== 0 ? `, ${money(row.driftCents)} beside the computed balance` : '';
}

function Rows({ empty, children }: { empty: string; children: ReactNode[] }) {
  return (
    <ul className="mt-1 border-t border-rule">
      {children}
      {children.length === 0 && <li className="border-b border-rule py-2 text-soft">{empty}</li>}
    </ul>
  );
}

function Row({ words, amount, paper, remove }: { words: string; amount: string; paper: ReactNode; remove: ReactNode }) {
  return (
    <li className="flex flex-wrap items-baseline justify-between gap-x-5 border-b border-rule py-2">
      <span className="min-w-0">
        {words} {paper}
      </span>
      <span className="ml-auto flex items-baseline gap-4">
        {remove}
        <span className="min-w-24 text-right">{amount}</span>
      </span>
    </li>
  );
}

function Add({ words, onClick }: { words: string; onClick: () => void }) {
  return (
    <p className="no-print mt-3">
      <Button look="plain" onClick={onClick}>
        {words}
      </Button>
    </p>
  );
}

/** Takes one thing back, after asking once. */
function Remove({ what, householdId, change }: { what: string; householdId: string; change: MortgageChange }) {
  const remove = useMortgageChange(householdId);
  const [asking, setAsking] = useState(false);
  const look = 'link no-print min-h-11 text-[15px] sm:min-h-9';
  if (!asking) {
    return (
      <button
        type="button"
        className={`${look} text-soft`}
        aria-label={`Remove ${what}`}
        onClick={() => setAsking(true)}
      >
        Remove
      </button>
    );
  }
  return (
    <span className="inline-flex flex-wrap items-center justify-end gap-x-3">
      {remove.isError && <span className="neg">{errorWords(remove.error)}</span>}
      <button type="button" className={look} disabled={remove.isPending} onClick={() => remove.mutate(change)}>
        Remove it
      </button>
      <button type="button" className={`${look} text-soft`} onClick={() => setAsking(false)}>
        Keep
      </button>
    </span>
  );
}
