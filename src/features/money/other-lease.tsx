import { useState } from 'react';
import type { LeaseBody, LeaseView } from '#shared/api/money-other.ts';
import type { LeaseFacts } from '#shared/facts/finance.ts';
import { fullDate, money } from '#src/lib/format.ts';
import { percentWords } from '#src/lib/typed-values.ts';
import { Button } from '#src/ui/button.tsx';
import { Field, SelectField } from '#src/ui/field.tsx';
import { MoneyFigure } from '#src/ui/figure.tsx';
import { FactsList } from './facts-list.tsx';
import { OtherDialog } from './other-dialog.tsx';
import { OtherRemove } from './other-remove.tsx';
import { type LeaseValues, leaseValues, readLease } from './other-values.ts';
import { PaperField } from './paper-field.tsx';
import { PaperLink } from './paper-link.tsx';

/** The lease or power-purchase agreement the roof is on: what it has cost, and what it does not give. */
export function LeasePart({
  lease,
  householdId,
  canEdit,
}: {
  lease: LeaseView;
  householdId: string;
  canEdit: boolean;
}) {
  const [editing, setEditing] = useState(false);
  const { facts } = lease;
  const name = facts.kind === 'lease' ? 'Lease' : 'Power-purchase agreement';
  return (
    <section className="mt-6">
      <h3>
        {name}
        {facts.company !== '' && <span className="font-normal"> with {facts.company}</span>}
      </h3>
      <FactsList
        rows={[
          {
            label: facts.kind === 'lease' ? 'Payment in the first year' : 'Price in the first year',
            value: facts.kind === 'lease' ? money(facts.monthlyCents) : `$${facts.ratePerKwh ?? '0'}`,
            hint: `${facts.kind === 'lease' ? 'each month' : 'per kWh made'}, rising ${percentWords(facts.yearlyRise)} a year`,
          },
          ...(lease.next === null
            ? []
            : [{ label: 'Next payment', value: money(lease.next.amountCents), hint: fullDate(lease.next.on) }]),
          {
            label: 'Paid so far',
            value: <MoneyFigure title={name} cents={lease.paid.amountCents} working={lease.paid.working} />,
          },
          { label: 'The term ends', value: fullDate(lease.endsOn) },
        ]}
      />
      {lease.missing.length > 0 && (
        <p className="margin-note mt-3">
          The production of {lease.missing.length === 1 ? 'one cycle' : `${lease.missing.length} cycles`} is not known
          (ending {lease.missing.map((to) => fullDate(to)).join('; ')}), so that what was paid for it is missing here.
        </p>
      )}
      <p className="hint mt-2">
        There is nothing to pay off, and the tax credit belongs to the owner of the system. Each payment is rounded to
        the cent once; the contract’s own wording decides.
      </p>
      <PaperLink householdId={householdId} documentId={facts.documentId} />
      {canEdit && (
        <p className="no-print mt-2 flex flex-wrap items-center gap-x-5">
          <button type="button" className="link min-h-11" onClick={() => setEditing(true)}>
            Change
            <span className="visually-hidden"> the {name.toLowerCase()}</span>
          </button>
          <OtherRemove what={`the ${name.toLowerCase()}`} householdId={householdId} change={{ kind: 'removeLease' }} />
        </p>
      )}
      {editing && <LeaseDialog lease={facts} householdId={householdId} onClose={() => setEditing(false)} />}
    </section>
  );
}

/** The way to enter a lease where there is none. */
export function EnterLease({ householdId }: { householdId: string }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button look="plain" onClick={() => setOpen(true)}>
        Enter a lease or power purchase
      </Button>
      {open && <LeaseDialog lease={null} householdId={householdId} onClose={() => setOpen(false)} />}
    </>
  );
}

function LeaseDialog({
  lease,
  householdId,
  onClose,
}: {
  lease: LeaseFacts | null;
  householdId: string;
  onClose: () => void;
}) {
  return (
    <OtherDialog<LeaseValues, LeaseBody>
      title="Lease or power purchase"
      hint="The company owns the roof’s system. Leave the tax credit out: it belongs to the system’s owner."
      householdId={householdId}
      defaults={leaseValues(lease)}
      read={readLease}
      change={(body) => ({ kind: 'putLease', body })}
      onClose={onClose}
    >
      {({ register, watch, setValue, formState: { errors } }) => {
        const [kind, documentId] = watch(['kind', 'documentId']);
        return (
          <>
            <SelectField label="Kind" error={errors.kind?.message} {...register('kind')}>
              <option value="lease">a lease, paid by the month</option>
              <option value="powerPurchase">a power purchase, paid by the kWh made</option>
            </SelectField>
            <Field label="Company" maxLength={120} error={errors.company?.message} {...register('company')} />
            {kind === 'lease' ? (
              <Field
                label="Payment a month"
                hint="As it is in the first year."
                unit="$"
                inputMode="decimal"
                error={errors.monthlyCents?.message}
                {...register('monthlyCents')}
              />
            ) : (
              <Field
                label="Price per kWh"
                hint="As it is in the first year."
                unit="$"
                inputMode="decimal"
                error={errors.ratePerKwh?.message}
                {...register('ratePerKwh')}
              />
            )}
            <Field
              label="Rise a year"
              hint="Leave empty for none."
              unit="%"
              inputMode="decimal"
              error={errors.yearlyRise?.message}
              {...register('yearlyRise')}
            />
            <Field
              label={kind === 'lease' ? 'First payment on' : 'Begins on'}
              type="date"
              error={errors.firstPaymentOn?.message}
              {...register('firstPaymentOn')}
            />
            <Field
              label="Term"
              unit="months"
              inputMode="numeric"
              error={errors.termMonths?.message}
              {...register('termMonths')}
            />
            <PaperField
              householdId={householdId}
              value={documentId}
              error={errors.documentId?.message}
              onChange={(id) => setValue('documentId', id, { shouldDirty: true })}
            />
          </>
        );
      }}
    </OtherDialog>
  );
}
