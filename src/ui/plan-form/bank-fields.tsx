import { Choices, Field } from '../field.tsx';
import { Fold } from '../fold.tsx';
import { AddRow, Columns, FormRow } from '../rows.tsx';
import { Tick, Ticks } from '../ticks.tsx';
import { changed, toggled, usePlanEdit, without } from './edit.ts';
import { newTrueUp } from './new-parts.ts';
import type { BankForm, TrueUpForm } from './plan-form.ts';
import { TickList, WordSelect } from './small-fields.tsx';
import { TrueUpFields } from './true-up-fields.tsx';
import { NETTING_WORDS } from './words.ts';

/** Where unused credit is kept: what it pays, when, and what becomes of the rest. */
export function BankFields({ bank, at }: { bank: BankForm; at: number }) {
  const { form, set, text, error, name } = usePlanEdit();
  const path = `banks.${at}`;
  const put = (changes: Partial<BankForm>) => set({ banks: changed(form.banks, at, changes) });
  const kwh = bank.unit === 'kWh';
  const payable = form.charges
    .filter((charge) =>
      kwh
        ? charge.basis === 'import' || charge.basis === 'load'
        : charge.basis !== 'floor' && !(charge.basis === 'percent' && charge.afterCredits),
    )
    .map(({ id, label }) => ({ value: id, label }));
  const paidWords = bank.offsets
    .map((id) => form.charges.find((charge) => charge.id === id)?.label || id)
    .join(', then ');
  const floors = form.charges.filter(({ basis }) => basis === 'floor');
  const trueUp = (index: number, changes: Partial<TrueUpForm>) =>
    put({ trueUps: changed(bank.trueUps, index, changes) });
  const unusual =
    bank.ratio !== '1' || bank.belowZero || bank.netting !== '' || bank.lotCycles !== '' || bank.keepMinimum !== '';
  return (
    <>
      <Columns>
        <Field label="Name, as the bill prints it" {...text(`${path}.label`, bank.label, (label) => put({ label }))} />
        <WordSelect
          label="It holds"
          value={bank.unit}
          words={[
            ['USD', 'dollars'],
            ['kWh', 'kWh'],
          ]}
          onChange={(unit) => put({ unit, offsets: [], byPeriod: false })}
        />
      </Columns>
      <TickList
        legend="What may the credit pay?"
        hint={bank.offsets.length > 1 ? `Paid in this order: ${paidWords}.` : undefined}
        error={error(`${path}.offsets`)}
        options={[
          ...payable,
          // What the plan names and cannot pay is shown, so that it can be taken out.
          ...bank.offsets
            .filter((id) => !payable.some(({ value }) => value === id))
            .map((id) => ({ value: id, label: form.charges.find((charge) => charge.id === id)?.label ?? id })),
        ]}
        ticked={bank.offsets}
        onChange={(id, on) => put({ offsets: toggled(bank.offsets, id, on) })}
      />
      <Choices
        legend="May a month’s credit pay that same month’s bill?"
        name={name(`${path}.sameCycle`)}
        value={bank.sameCycle ? 'same' : 'next'}
        onChange={(value) => put({ sameCycle: value === 'same' })}
        options={[
          { value: 'same', label: 'Yes' },
          { value: 'next', label: 'No, from the next bill on' },
        ]}
      />
      <p className="field-label mt-5">What becomes of credit that stays unused?</p>
      {bank.trueUps.length === 0 && (
        <p>It is carried on{bank.lotCycles === '' ? '' : `, for ${bank.lotCycles} bills`}.</p>
      )}
      {bank.trueUps.map((one, index) => (
        <FormRow
          // biome-ignore lint/suspicious/noArrayIndexKey: a true-up has no name but its place
          key={index}
          title={bank.trueUps.length === 1 ? 'Unused credit' : `Unused credit, ${index + 1}`}
          onRemove={() => put({ trueUps: without(bank.trueUps, index) })}
        >
          <TrueUpFields
            trueUp={one}
            bank={bank}
            path={`${path}.trueUps.${index}`}
            put={(changes) => trueUp(index, changes)}
          />
        </FormRow>
      ))}
      <AddRow onClick={() => put({ trueUps: [...bank.trueUps, newTrueUp()] })}>
        {bank.trueUps.length === 0 ? 'It lapses or is paid out' : 'Add another time it lapses or is paid'}
      </AddRow>
      <Fold title="More about this credit" open={unusual} summary={unusual ? undefined : 'nothing unusual'}>
        <Columns>
          <Field
            label="Each month’s credit lasts"
            hint="Oldest is used first. Leave empty where it does not age."
            unit="bills"
            inputMode="numeric"
            {...text(`${path}.lotCycles`, bank.lotCycles, (lotCycles) => put({ lotCycles }))}
          />
          {kwh && (
            <Field
              label="kWh kept for each kWh sent out"
              inputMode="decimal"
              {...text(`${path}.ratio`, bank.ratio, (ratio) => put({ ratio }))}
            />
          )}
          {kwh && (
            <WordSelect
              label="What you buy is taken off first"
              error={error(`${path}.netting`)}
              value={bank.netting}
              words={[['', 'as said above'], ...(Object.entries(NETTING_WORDS) as [BankForm['netting'], string][])]}
              onChange={(netting) => put({ netting })}
            />
          )}
          {!kwh && floors.length > 0 && (
            <WordSelect
              label="Credit stops where the bill would fall below"
              error={error(`${path}.keepMinimum`)}
              value={bank.keepMinimum}
              words={[
                ['', 'nothing: it is spent, and the minimum tops up'],
                ...floors.map(({ id, label }) => [id, label] as const),
              ]}
              onChange={(keepMinimum) => put({ keepMinimum })}
            />
          )}
          {bank.byPeriod && (
            <WordSelect
              label="If a bill lacks a period"
              value={bank.ifPeriodAbsent}
              words={[
                ['hold', 'its kWh wait for one that has it'],
                ['otherPeriods', 'its kWh go to the other periods'],
              ]}
              onChange={(ifPeriodAbsent) => put({ ifPeriodAbsent })}
            />
          )}
        </Columns>
        <Ticks>
          {kwh && form.periods.length > 0 && (
            <Tick
              label="kWh are kept apart by time-of-use period"
              checked={bank.byPeriod}
              onChange={(byPeriod) => put({ byPeriod })}
            />
          )}
          <Tick
            label="What it may pay is only settled once a year"
            hint="A yearly ledger: the balance may go below zero, and is billed at its end."
            checked={bank.belowZero}
            onChange={(belowZero) => put({ belowZero })}
          />
        </Ticks>
      </Fold>
    </>
  );
}
