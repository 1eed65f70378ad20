import { useFieldArray } from 'react-hook-form';
import { subtractCents } from '#shared/units/cents.ts';
import { money } from '#src/lib/format.ts';
import { Field } from '#src/ui/field.tsx';
import { type Form, Three } from './fields-row.tsx';
import { runningSum } from './running-sum.ts';

/** The credit banks a statement prints; nothing where it prints none. */
export function BankFields({ form }: { form: Form }) {
  const banks = useFieldArray({ control: form.control, name: 'banks' });
  const { errors } = form.formState;
  if (banks.fields.length === 0) return null;
  return (
    <section className="sheet">
      <h2>Credit bank</h2>
      {banks.fields.map((bank, index) => {
        const amount = {
          inputMode: 'decimal',
          className: 'input-number',
          unit: bank.unit === 'USD' ? '$' : 'kWh',
        } as const;
        return (
          <Three key={bank.id}>
            <p className="self-center pt-4 font-semibold">{bank.label}</p>
            <Field
              label="Brought in"
              {...amount}
              error={errors.banks?.[index]?.open?.message}
              {...form.register(`banks.${index}.open`)}
            />
            <Field
              label="Carried on"
              {...amount}
              error={errors.banks?.[index]?.close?.message}
              {...form.register(`banks.${index}.close`)}
            />
          </Three>
        );
      })}
    </section>
  );
}

/** Previous balance, payments, amount due, and what the lines come to against it. */
export function BalanceFields({ form }: { form: Form }) {
  const { errors } = form.formState;
  const dollars = { inputMode: 'text', unit: '$', className: 'input-number' } as const;
  return (
    <section className="sheet">
      <h2>Balance</h2>
      <Three>
        <Field
          label="Previous balance"
          {...dollars}
          error={errors.previousBalance?.message}
          {...form.register('previousBalance')}
        />
        <Field
          label="Payments, with a minus"
          {...dollars}
          error={errors.payments?.message}
          {...form.register('payments')}
        />
        <Field label="Amount due" {...dollars} error={errors.due?.message} {...form.register('due')} />
      </Three>
      <Sum form={form} />
    </section>
  );
}

/** What the typed lines come to, held against the amount due in whole cents. */
function Sum({ form }: { form: Form }) {
  const [lines, previousBalance, payments, due] = form.watch(['lines', 'previousBalance', 'payments', 'due']);
  const sum = runningSum({ lines, previousBalance, payments, due });
  return (
    <p className="mt-4 border-t-4 border-double border-ink pt-2" aria-live="polite">
      The lines, balance and payments come to <b>{money(sum.linesCents)}</b>
      {sum.dueCents === null || sum.unread > 0 ? (
        <span className="hint"> so far.</span>
      ) : sum.dueCents === sum.linesCents ? (
        <span className="mark-ok ml-3">they add up to the amount due</span>
      ) : (
        <span className="mark-no ml-3">
          the amount due is {money(subtractCents(sum.dueCents, sum.linesCents))} away
        </span>
      )}
    </p>
  );
}
