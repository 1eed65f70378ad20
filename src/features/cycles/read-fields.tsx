import { type UseFormReturn, useFieldArray } from 'react-hook-form';
import { Button } from '#src/ui/button.tsx';
import { Field, SelectField } from '#src/ui/field.tsx';
import { Group, Remove, Row } from './form-parts.tsx';
import type { StatementValues } from './statement-values.ts';

/** The register reads of a statement. */
export function ReadFields({ form }: { form: UseFormReturn<StatementValues> }) {
  const { register, control, formState } = form;
  const { errors } = formState;
  const reads = useFieldArray({ control, name: 'reads' });
  return (
    <Group title="Register reads">
      {reads.fields.map((read, index) => (
        <fieldset key={read.id} className="border-b border-rule pb-3">
          <legend className="visually-hidden">Read {index + 1}</legend>
          <Row>
            <Field label="Meter" {...register(`reads.${index}.meter`)} />
            <SelectField label="Channel" {...register(`reads.${index}.channel`)}>
              <option value="import">import</option>
              <option value="export">export</option>
              <option value="production">production</option>
            </SelectField>
            <Field
              label="Previous"
              inputMode="decimal"
              error={errors.reads?.[index]?.previous?.message}
              {...register(`reads.${index}.previous`)}
            />
            <Field
              label="Current"
              inputMode="decimal"
              error={errors.reads?.[index]?.current?.message}
              {...register(`reads.${index}.current`)}
            />
            <SelectField label="Read type" {...register(`reads.${index}.type`)}>
              <option value="actual">actual</option>
              <option value="estimated">estimated</option>
            </SelectField>
            <Field
              label="From"
              type="date"
              error={errors.reads?.[index]?.from?.message}
              {...register(`reads.${index}.from`)}
            />
            <Field
              label="To"
              type="date"
              error={errors.reads?.[index]?.to?.message}
              {...register(`reads.${index}.to`)}
            />
            <Field
              label="Dials"
              inputMode="numeric"
              error={errors.reads?.[index]?.dials?.message}
              {...register(`reads.${index}.dials`)}
            />
            <Field
              label="Multiplier"
              inputMode="decimal"
              error={errors.reads?.[index]?.multiplier?.message}
              {...register(`reads.${index}.multiplier`)}
            />
          </Row>
          <Remove what={`read ${index + 1}`} onClick={() => reads.remove(index)} />
        </fieldset>
      ))}
      <Button
        look="link"
        onClick={() =>
          reads.append({
            meter: reads.fields[0]?.meter ?? '',
            channel: 'import',
            from: form.getValues('from'),
            to: form.getValues('to'),
            previous: '',
            current: '',
            dials: reads.fields[0]?.dials ?? '5',
            multiplier: '1',
            type: 'actual',
            row: null,
          })
        }
      >
        Add a read
      </Button>
    </Group>
  );
}
