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
            <SentOut form={form} index={index} unit={amount.unit} />
          </Three>
        );
      })}
    </section>
  );
}

/** Surplus of a bank that went to other service points; folded away, for few statements print it. */
function SentOut({ form, index, unit }: { form: Form; index: number; unit: string }) {
  const errors = form.formState.errors.banks?.[index];
  const [sent, value] = form.getValues([`banks.${index}.sentOut`, `banks.${index}.sentValue`]);
  const open = sent !== '' || value !== '' || errors?.sentOut !== undefined || errors?.sentValue !== undefined;
  return (
    <details open={open} className="sm:col-span-3">
      <summary className="link hint inline-flex min-h-11 cursor-pointer items-center">
        Sent to another service point
      </summary>
      <Three>
        <Field
          label="Sent on in this cycle"
          inputMode="decimal"
          className="input-number"
          unit={unit}
          error={errors?.sentOut?.message}
          {...form.register(`banks.${index}.sentOut`)}
        />
        <Field
          label="What it saved there, if printed"
          hint="As the other bill prints it. Left empty, it counts as nothing."
          inputMode="decimal"
          className="input-number"
          unit="$"
          error={errors?.sentValue?.message}
          {...form.register(`banks.${index}.sentValue`)}
        />
      </Three>
    </details>
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
      <BudgetFields form={form} />
      <Sum form={form} />
    </section>
  );
}

/** The budget plan's own figures; folded away where the bill is on none. */
function BudgetFields({ form }: { form: Form }) {
  const { errors } = form.formState;
  const dollars = { inputMode: 'text', unit: '$', className: 'input-number' } as const;
  const [budget, balance, settled] = form.getValues(['budget', 'budgetBalance', 'budgetSettled']);
  const wrong = errors.budget ?? errors.budgetBalance ?? errors.budgetSettled;
  return (
    <details open={[budget, balance, settled].some((text) => text !== '') || wrong !== undefined}>
      <summary className="link hint inline-flex min-h-11 cursor-pointer items-center">
        The bill is on a budget (levelized) plan
      </summary>
      <p className="hint">
        The lines above stay the real charges. The amount due then holds the budget amount in place of those for
        electricity, and the rest goes to the budget balance.
      </p>
      <Three>
        <Field label="Budget amount" {...dollars} error={errors.budget?.message} {...form.register('budget')} />
        <Field
          label="Budget balance after this bill"
          hint="With a minus where they owe you."
          {...dollars}
          error={errors.budgetBalance?.message}
          {...form.register('budgetBalance')}
        />
        <Field
          label="Settlement, once a year"
          hint="The balance charged on this bill, or paid back with a minus."
          {...dollars}
          error={errors.budgetSettled?.message}
          {...form.register('budgetSettled')}
        />
      </Three>
    </details>
  );
}

/** What the typed lines come to, held against the amount due in whole cents. */
function Sum({ form }: { form: Form }) {
  const [lines, previousBalance, payments, due, budget, budgetSettled] = form.watch([
    'lines',
    'previousBalance',
    'payments',
    'due',
    'budget',
    'budgetSettled',
  ]);
  const sum = runningSum({ lines, previousBalance, payments, due, budget, budgetSettled });
  return (
    <p className="mt-4 border-t-4 border-double border-ink pt-2" aria-live="polite">
      {budget.trim() === ''
        ? 'The lines, balance and payments come to '
        : 'The budget amount, other services, balance and payments come to '}
      <b>{money(sum.linesCents)}</b>
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
