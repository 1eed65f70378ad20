import { zodResolver } from '@hookform/resolvers/zod';
import { useFieldArray, useForm, useWatch } from 'react-hook-form';
import { type SetupView, setupApi } from '#shared/api/setup.ts';
import { sumWh } from '#shared/units/energy.ts';
import { MONTH_NAMES } from '#shared/units/words.ts';
import { kwh } from '#src/lib/format.ts';
import { newId } from '#src/lib/new-id.ts';
import { fieldValue, textOf, typed } from '#src/lib/typed-values.ts';
import { Field } from '#src/ui/field.tsx';
import { AddRow, Columns, FormRow, Part } from '#src/ui/rows.tsx';
import { MetersPart } from './meters-part.tsx';
import { kilowatts, kindOf, METER_KINDS, type RoofForm, roofForm, wattsOf } from './roof-form.ts';
import { StepForm } from './step-form.tsx';

const MONTHS = MONTH_NAMES.map((name) => name.slice(0, 3));

const emptyArray = () => ({ key: newId(), label: '', modules: '', watts: '', tilt: '', facing: '' });

export function RoofStep({ view }: { view: SetupView }) {
  const { house } = view;
  const form = useForm({
    resolver: zodResolver(roofForm),
    mode: 'onTouched',
    defaultValues: {
      arrays:
        house.arrays.length === 0
          ? [{ ...emptyArray(), label: 'Roof' }]
          : house.arrays.map((array) => ({
              key: array.id,
              label: array.label,
              modules: String(array.modules),
              watts: String(array.moduleWatts),
              tilt: textOf.whole(array.tiltDegrees),
              facing: textOf.whole(array.facingDegrees),
            })),
      acKw: house.inverterAcWatts === null ? '' : kilowatts(house.inverterAcWatts).replace(/\.00$/, ''),
      months: MONTHS.map((_, index) => ({ kwh: textOf.wh(house.expectedMonthlyWh?.[index] ?? null) })),
      meters: house.meters.map((meter) => ({
        number: meter.id,
        label: meter.label,
        kind: kindOf(meter),
        dials: String(meter.dials),
        multiplier: meter.multiplier,
        servicePoint: meter.servicePoint ?? '',
      })),
      aggregation: house.aggregation,
    },
  });
  const arrays = useFieldArray({ control: form.control, name: 'arrays' });
  const { errors } = form.formState;
  return (
    <StepForm
      step="roof"
      form={form}
      endpoint={setupApi.roof}
      toBody={(values) => ({
        arrays: values.arrays.map((array) => ({
          id: array.key,
          label: array.label.trim(),
          modules: fieldValue.whole(array.modules),
          moduleWatts: fieldValue.whole(array.watts),
          tiltDegrees: fieldValue.wholeOrNull(array.tilt),
          facingDegrees: fieldValue.wholeOrNull(array.facing),
        })),
        inverterAcWatts: wattsOf(values.acKw),
        expectedMonthlyWh:
          values.months[0]?.kwh.trim() === '' ? null : values.months.map((month) => fieldValue.wh(month.kwh)),
        meters: values.meters.map((meter) => ({
          id: meter.number.trim(),
          label: meter.label.trim() || METER_KINDS[meter.kind].words,
          channels: [...METER_KINDS[meter.kind].channels],
          dials: fieldValue.whole(meter.dials),
          multiplier: fieldValue.decimal(meter.multiplier),
          servicePoint: meter.servicePoint.trim() || null,
        })),
        aggregation: values.meters.some((meter) => meter.servicePoint.trim() !== '') ? values.aggregation : 'none',
      })}
    >
      {arrays.fields.map((row, index) => {
        const at = errors.arrays?.[index];
        const remove = arrays.fields.length > 1 ? () => arrays.remove(index) : null;
        return (
          <FormRow key={row.id} title={arrays.fields.length > 1 ? `Array ${index + 1}` : 'The array'} onRemove={remove}>
            <Field label="Name" error={at?.label?.message} {...form.register(`arrays.${index}.label`)} />
            <Columns>
              <Field
                label="Modules"
                inputMode="numeric"
                error={at?.modules?.message}
                {...form.register(`arrays.${index}.modules`)}
              />
              <Field
                label="Watts each"
                inputMode="numeric"
                unit="W"
                error={at?.watts?.message}
                {...form.register(`arrays.${index}.watts`)}
              />
              <Field
                label="Tilt, if known"
                inputMode="numeric"
                unit="°"
                error={at?.tilt?.message}
                {...form.register(`arrays.${index}.tilt`)}
              />
              <Field
                label="Facing, if known"
                inputMode="numeric"
                unit="° (south 180)"
                error={at?.facing?.message}
                {...form.register(`arrays.${index}.facing`)}
              />
            </Columns>
          </FormRow>
        );
      })}
      <Rating control={form.control} />
      <AddRow onClick={() => arrays.append(emptyArray())}>Add an array that faces another way</AddRow>
      <Field
        label="Inverters together, AC"
        hint="The sum of the AC ratings on the plates or the contract, if you have them."
        inputMode="decimal"
        unit="kW"
        className="max-w-[160px]"
        error={errors.acKw?.message}
        {...form.register('acKw')}
      />
      <Part
        title="The installer’s estimate by month, if you have it"
        hint="From the contract or proposal. Each month is then held against it, and a shaded or failed string shows."
      >
        <div className="grid grid-cols-2 gap-x-6 sm:grid-cols-4">
          {MONTHS.map((month, index) => (
            <Field
              key={month}
              label={month}
              inputMode="decimal"
              unit="kWh"
              className="input-number"
              error={errors.months?.[index]?.kwh?.message}
              {...form.register(`months.${index}.kwh`)}
            />
          ))}
        </div>
        <YearTotal control={form.control} />
      </Part>
      <MetersPart form={form} />
    </StepForm>
  );
}

type Control = ReturnType<typeof useForm<RoofForm>>['control'];

/** "28 × 410 W = 11.48 kW DC", as it is typed. */
function Rating({ control }: { control: Control }) {
  const arrays = useWatch({ control, name: 'arrays' });
  const known = arrays.filter((array) => /^\d+$/.test(array.modules.trim()) && /^\d+$/.test(array.watts.trim()));
  if (known.length === 0) return <p className="hint mt-3">The rating appears here: modules × watts.</p>;
  const watts = known.reduce((sum, array) => sum + Number(array.modules) * Number(array.watts), 0);
  const parts = known.map((array) => `${Number(array.modules)} × ${Number(array.watts)} W`).join(' + ');
  return (
    <p className="mt-3" aria-live="polite">
      {parts} = <b>{kilowatts(watts)} kW DC</b>
    </p>
  );
}

function YearTotal({ control }: { control: Control }) {
  const months = useWatch({ control, name: 'months' });
  if (months.some((month) => month.kwh.trim() === '' || !typed.kwh.safeParse(month.kwh).success)) return null;
  return (
    <p className="mt-3">
      A year: <b>{kwh(sumWh(months.map((month) => fieldValue.wh(month.kwh))))} kWh</b>
    </p>
  );
}
