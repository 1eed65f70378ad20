import { type UseFormReturn, useFieldArray, useWatch } from 'react-hook-form';
import { Field, SelectField } from '#src/ui/field.tsx';
import { AddRow, Columns, FormRow, Part } from '#src/ui/rows.tsx';
import { AGGREGATION_WORDS, AGGREGATIONS, KINDS, METER_KINDS, type RoofForm } from './roof-form.ts';

/** The house's meters, with what the utility does with one that serves another place. */
export function MetersPart({ form }: { form: UseFormReturn<RoofForm> }) {
  const meters = useFieldArray({ control: form.control, name: 'meters' });
  const { errors } = form.formState;
  const apart = useWatch({ control: form.control, name: 'meters' }).some((meter) => meter.servicePoint.trim() !== '');
  return (
    <Part
      title="Meters, if you like"
      hint="With dials and multiplier a register that turns over or is exchanged still adds up."
    >
      {meters.fields.map((row, index) => {
        const at = errors.meters?.[index];
        return (
          <FormRow key={row.id} title={`Meter ${index + 1}`} onRemove={() => meters.remove(index)}>
            <Columns>
              <Field
                label="Number, as statements print it"
                error={at?.number?.message}
                {...form.register(`meters.${index}.number`)}
              />
              <Field label="Name, if you like" error={at?.label?.message} {...form.register(`meters.${index}.label`)} />
              <SelectField label="What it counts" error={at?.kind?.message} {...form.register(`meters.${index}.kind`)}>
                {KINDS.map((kind) => (
                  <option key={kind} value={kind}>
                    {METER_KINDS[kind].words}
                  </option>
                ))}
              </SelectField>
              <Field
                label="Dials or digits"
                inputMode="numeric"
                error={at?.dials?.message}
                {...form.register(`meters.${index}.dials`)}
              />
              <Field
                label="Multiplier"
                inputMode="decimal"
                error={at?.multiplier?.message}
                {...form.register(`meters.${index}.multiplier`)}
              />
              <Field
                label="Serves another place, if so"
                hint="A barn, a second house; empty for the house itself."
                error={at?.servicePoint?.message}
                {...form.register(`meters.${index}.servicePoint`)}
              />
            </Columns>
          </FormRow>
        );
      })}
      <AddRow
        onClick={() =>
          meters.append({ number: '', label: '', kind: 'net', dials: '5', multiplier: '1', servicePoint: '' })
        }
      >
        Add a meter
      </AddRow>
      {apart && (
        <SelectField
          label="What the utility does with the other place’s meter"
          hint="Called meter aggregation or shared net metering on the tariff sheet."
          {...form.register('aggregation')}
        >
          {AGGREGATIONS.map((one) => (
            <option key={one} value={one}>
              {AGGREGATION_WORDS[one]}
            </option>
          ))}
        </SelectField>
      )}
    </Part>
  );
}
