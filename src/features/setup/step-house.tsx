import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import * as z from 'zod/mini';
import { type SetupView, setupApi } from '#shared/api/setup.ts';
import { fieldValue, textOf, typed } from '#src/lib/typed-values.ts';
import { Field } from '#src/ui/field.tsx';
import { Columns, Part } from '#src/ui/rows.tsx';
import { StepForm } from './step-form.tsx';
import { TimeZoneField } from './time-zone-field.tsx';

function degrees(limit: number) {
  return z.string().check(
    z.refine(
      (text) =>
        text.trim() === '' ||
        (/^[+\-\u2212]?\d{1,3}(\.\d{1,8})?$/.test(text.trim()) &&
          Math.abs(Number(text.replace('\u2212', '-'))) <= limit),
      {
        error: `Write degrees from −${limit} to ${limit} with a point, or leave it empty.`,
      },
    ),
  );
}

const houseForm = z
  .object({
    name: z.string().check(z.trim(), z.minLength(1, { error: 'Write a name, such as the address.' }), z.maxLength(120)),
    place: z.string().check(z.maxLength(160)),
    utility: z.string().check(z.maxLength(120)),
    timeZone: z.string(),
    switchOn: typed.day,
    latitude: degrees(90),
    longitude: degrees(180),
  })
  .check(
    z.refine((form) => (form.latitude.trim() === '') === (form.longitude.trim() === ''), {
      error: 'Write both coordinates, or neither.',
      path: ['longitude'],
    }),
  );

const numberOrNull = (text: string) => (text.trim() === '' ? null : Number(text.replace('\u2212', '-')));

export function HouseStep({ view }: { view: SetupView }) {
  const { house } = view;
  const form = useForm({
    resolver: zodResolver(houseForm),
    mode: 'onTouched',
    defaultValues: {
      name: house.name,
      place: house.place,
      utility: house.utility,
      timeZone: house.timeZone,
      switchOn: textOf.text(house.switchOn),
      latitude: house.latitude === null ? '' : String(house.latitude),
      longitude: house.longitude === null ? '' : String(house.longitude),
    },
  });
  const { errors } = form.formState;
  return (
    <StepForm
      step="house"
      form={form}
      endpoint={setupApi.house}
      toBody={(values) => ({
        name: values.name.trim(),
        place: values.place.trim(),
        utility: values.utility.trim(),
        timeZone: values.timeZone,
        switchOn: fieldValue.dayOrNull(values.switchOn),
        latitude: numberOrNull(values.latitude),
        longitude: numberOrNull(values.longitude),
      })}
    >
      <Field label="Name of the household" error={errors.name?.message} {...form.register('name')} />
      <Columns>
        <Field label="Town" error={errors.place?.message} {...form.register('place')} />
        <Field label="Electric utility" error={errors.utility?.message} {...form.register('utility')} />
      </Columns>
      <Field
        label="Switch-on day"
        hint="The day of permission to operate, from the utility’s letter. Not the day the modules went up."
        type="date"
        className="max-w-[220px]"
        error={errors.switchOn?.message}
        {...form.register('switchOn')}
      />
      <TimeZoneField current={form.watch('timeZone')} error={errors.timeZone?.message} {...form.register('timeZone')} />
      <Part
        title="Coordinates, if you like"
        hint="For checking that nothing is produced at night, which gives a wrong clock away. Two decimals are enough."
      >
        <Columns>
          <Field
            label="Latitude"
            inputMode="text"
            unit="° north"
            error={errors.latitude?.message}
            {...form.register('latitude')}
          />
          <Field
            label="Longitude"
            inputMode="text"
            unit="° east"
            error={errors.longitude?.message}
            {...form.register('longitude')}
          />
        </Columns>
        <p className="hint mt-1">In the United States the longitude is negative, such as −71.06.</p>
      </Part>
    </StepForm>
  );
}
