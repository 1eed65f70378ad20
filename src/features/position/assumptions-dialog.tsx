import { useState } from 'react';
import { useForm } from 'react-hook-form';
import type { Assumptions } from '#shared/facts/household.ts';
import { parseDollars, ZERO_CENTS } from '#shared/units/cents.ts';
import { FaultList, type Reading, resolverOf } from '#src/lib/form.ts';
import { showRefusal } from '#src/lib/form-faults.ts';
import { fractionOfPercent, percentOfFraction, plainDecimal, textOf } from '#src/lib/typed-values.ts';
import { Button } from '#src/ui/button.tsx';
import { Dialog } from '#src/ui/dialog.tsx';
import { ErrorSummary, Field } from '#src/ui/field.tsx';
import { useSaveAssumptions } from './outlook-queries.ts';

type Values = {
  degradation: string;
  priceRise: string;
  horizonYears: string;
  upkeepYearlyCents: string;
  discountRate: string;
  grid: { lbPerMwh: string; region: string; basis: string; year: string };
};

const PERCENT = 'Write a percent such as 2.5.';

/** What the projection takes for granted, to be changed by an owner; it is checked as it is typed and nothing typed is lost. */
export function AssumptionsDialog({
  householdId,
  assumptions,
  onClose,
}: {
  householdId: string;
  assumptions: Assumptions;
  onClose: () => void;
}) {
  const save = useSaveAssumptions(householdId);
  const [refused, setRefused] = useState<string[]>([]);
  const form = useForm<Values>({
    defaultValues: valuesOf(assumptions),
    resolver: resolverOf(readAssumptions),
    mode: 'onTouched',
  });
  const { register } = form;
  const { errors } = form.formState;
  const submit = form.handleSubmit((values) => {
    const reading = readAssumptions(values);
    if (!reading.ok) return;
    setRefused([]);
    save.mutate(reading.body, {
      onSuccess: onClose,
      onError: (error) => setRefused(showRefusal<Values>(error, form.setError, isField)),
    });
  });
  return (
    <Dialog title="Assumptions" onClose={onClose}>
      <p className="hint">These change what is projected, and no figure of the record.</p>
      <ErrorSummary errors={refused.map((text) => ({ text }))} title="Not saved" />
      <form noValidate onSubmit={submit}>
        <Field
          label="Production lost each year"
          unit="%"
          inputMode="decimal"
          error={errors.degradation?.message}
          {...register('degradation')}
        />
        <Field
          label="Rise of the utility’s prices each year"
          hint="2.5 % is near the mean of 2010 to 2024 in the United States; 0 and 5 are worth a look."
          unit="%"
          inputMode="decimal"
          error={errors.priceRise?.message}
          {...register('priceRise')}
        />
        <Field
          label="Years projected"
          unit="years"
          inputMode="numeric"
          error={errors.horizonYears?.message}
          {...register('horizonYears')}
        />
        <Field
          label="Upkeep each year"
          unit="$"
          inputMode="decimal"
          error={errors.upkeepYearlyCents?.message}
          {...register('upkeepYearlyCents')}
        />
        <Field
          label="Discount rate"
          hint="What a sum a year away is worth less; for the handbook figures alone."
          unit="%"
          inputMode="decimal"
          error={errors.discountRate?.message}
          {...register('discountRate')}
        />
        <fieldset className="field">
          <legend className="field-label">Emissions of the grid</legend>
          <Field
            label="Pounds of CO₂ per MWh"
            hint="A published factor, such as your region’s in eGRID."
            inputMode="decimal"
            error={errors.grid?.lbPerMwh?.message}
            {...register('grid.lbPerMwh')}
          />
          <Field label="Region" error={errors.grid?.region?.message} {...register('grid.region')} />
          <Field
            label="Basis"
            hint="Such as total output or non-baseload."
            error={errors.grid?.basis?.message}
            {...register('grid.basis')}
          />
          <Field
            label="Year of the factor"
            inputMode="numeric"
            error={errors.grid?.year?.message}
            {...register('grid.year')}
          />
        </fieldset>
        <p className="mt-6">
          <Button type="submit" busy={save.isPending}>
            Save
          </Button>
        </p>
      </form>
    </Dialog>
  );
}

const FIELDS = [
  'degradation',
  'priceRise',
  'horizonYears',
  'upkeepYearlyCents',
  'discountRate',
  'grid.lbPerMwh',
  'grid.region',
  'grid.basis',
  'grid.year',
];

function isField(field: string): boolean {
  return FIELDS.includes(field);
}

function valuesOf({
  degradation,
  priceRise,
  horizonMonths,
  upkeepYearlyCents,
  discountRate,
  grid,
}: Assumptions): Values {
  return {
    degradation: percentOfFraction(degradation),
    priceRise: percentOfFraction(priceRise),
    horizonYears: horizonMonths % 12 === 0 ? String(horizonMonths / 12) : `${horizonMonths} months`,
    upkeepYearlyCents: textOf.cents(upkeepYearlyCents),
    discountRate: percentOfFraction(discountRate),
    grid: { lbPerMwh: grid.lbPerMwh, region: grid.region, basis: grid.basis, year: String(grid.year) },
  };
}

/** Reads the form's texts as assumptions; the horizon in years, or in months where it says so. */
export function readAssumptions(values: Values): Reading<Assumptions> {
  const faults = new FaultList();
  const text = (value: string, path: string) =>
    faults.needed(
      value,
      (typed) => (typed.trim().length <= 80 ? typed.trim() : null),
      path,
      'Write 80 characters or fewer.',
      '–',
    );
  return faults.reading({
    degradation: faults.needed(values.degradation, fractionOfPercent, 'degradation', PERCENT, '0'),
    priceRise: faults.needed(values.priceRise, fractionOfPercent, 'priceRise', PERCENT, '0'),
    horizonMonths: faults.needed(values.horizonYears, monthsOf, 'horizonYears', 'Write 1 to 40 years.', 12),
    upkeepYearlyCents: faults.needed(
      values.upkeepYearlyCents,
      (typed) => {
        const amount = parseDollars(typed);
        return amount !== null && amount >= 0 ? amount : null;
      },
      'upkeepYearlyCents',
      'Write an amount of zero or more, such as 120.00.',
      ZERO_CENTS,
    ),
    discountRate: faults.needed(values.discountRate, fractionOfPercent, 'discountRate', PERCENT, '0'),
    grid: {
      lbPerMwh: faults.needed(
        values.grid.lbPerMwh,
        plainDecimal,
        'grid.lbPerMwh',
        'Write a number such as 823.149.',
        '0',
      ),
      region: text(values.grid.region, 'grid.region'),
      basis: text(values.grid.basis, 'grid.basis'),
      year: faults.needed(
        values.grid.year,
        (typed) => (/^\d{4}$/.test(typed.trim()) ? Number(typed.trim()) : null),
        'grid.year',
        'Write a year such as 2022.',
        2022,
      ),
    },
  });
}

function monthsOf(typed: string): number | null {
  const match = /^(\d{1,3})\s*(months|years)?$/.exec(typed.trim());
  if (!match) return null;
  const months = Number(match[1]) * (match[2] === 'months' ? 1 : 12);
  return months >= 12 && months <= 480 ? months : null;
}
