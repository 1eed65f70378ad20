import { useState } from 'react';
import { type DraftReadings, dateOrder, energyUnit, type ProductionMapping } from '#shared/api/log.ts';
import { intervalChannel } from '#shared/facts/papers.ts';
import { useHousehold } from '#src/lib/household.ts';
import { errorWords } from '#src/lib/problem-words.ts';
import { Button } from '#src/ui/button.tsx';
import { Field, SelectField } from '#src/ui/field.tsx';
import { useChangeMapping } from './log-queries.ts';
import { CHANNEL_NAMES } from './readings-sheet.tsx';

const DATE_ORDERS = { ymd: 'year, month, day', mdy: 'month, day, year', dmy: 'day, month, year' } as const;
const UNITS = {
  Wh: 'Wh',
  kWh: 'kWh',
  W: 'W (mean power of the step)',
  kW: 'kW (mean power of the step)',
} as const;

/** How a readings file is read, as the owner may correct it. The file is read again on the server. */
export function MappingForm({ readings }: { readings: DraftReadings }) {
  const { id } = useHousehold();
  const change = useChangeMapping(id);
  const [mapping, setMapping] = useState<ProductionMapping>(readings.mapping);
  const doubted = new Set(readings.doubts.map((doubt) => doubt.field));
  const set = (part: Partial<ProductionMapping>) => setMapping((before) => ({ ...before, ...part }));
  const hintOf = (field: keyof ProductionMapping) =>
    doubted.has(field) ? 'The file does not make this sure.' : undefined;
  const columns = readings.columns.map((name, index) => ({ index, name: name || `Column ${index + 1}` }));
  const options = columns.map((column) => (
    <option key={column.index} value={String(column.index)}>
      {column.name}
    </option>
  ));
  return (
    <form
      onSubmit={(event) => {
        event.preventDefault();
        change.mutate({ key: readings.key, mapping });
      }}
    >
      <div className="grid items-end gap-x-6 sm:grid-cols-2 lg:grid-cols-3">
        <SelectField
          label="What it measures"
          hint={hintOf('channel')}
          value={mapping.channel}
          onChange={(event) => set({ channel: intervalChannel.parse(event.target.value) })}
        >
          {intervalChannel.options.map((channel) => (
            <option key={channel} value={channel}>
              {CHANNEL_NAMES[channel]}
            </option>
          ))}
        </SelectField>
        <SelectField
          label="Time column"
          hint={hintOf('timeColumn')}
          value={String(mapping.timeColumn)}
          onChange={(event) => set({ timeColumn: Number(event.target.value) })}
        >
          {options}
        </SelectField>
        <SelectField
          label="Time of day, if apart"
          hint={hintOf('clockColumn')}
          value={mapping.clockColumn === null ? '' : String(mapping.clockColumn)}
          onChange={(event) => set({ clockColumn: event.target.value === '' ? null : Number(event.target.value) })}
        >
          <option value="">in the same column</option>
          {options}
        </SelectField>
        <SelectField
          label="Energy column"
          hint={hintOf('energyColumn')}
          value={String(mapping.energyColumn)}
          onChange={(event) => set({ energyColumn: Number(event.target.value) })}
        >
          {options}
        </SelectField>
        <SelectField
          label="Unit"
          hint={hintOf('unit')}
          value={mapping.unit}
          onChange={(event) => set({ unit: energyUnit.parse(event.target.value) })}
        >
          {energyUnit.options.map((unit) => (
            <option key={unit} value={unit}>
              {UNITS[unit]}
            </option>
          ))}
        </SelectField>
        <SelectField
          label="Each value is"
          hint={hintOf('quantity')}
          value={mapping.quantity}
          onChange={(event) => set({ quantity: event.target.value === 'register' ? 'register' : 'interval' })}
        >
          <option value="interval">the energy of its step</option>
          <option value="register">a running total</option>
        </SelectField>
        <SelectField
          label="Dates are written"
          hint={hintOf('dateOrder')}
          value={mapping.dateOrder}
          onChange={(event) => set({ dateOrder: dateOrder.parse(event.target.value) })}
        >
          {dateOrder.options.map((order) => (
            <option key={order} value={order}>
              {DATE_ORDERS[order]}
            </option>
          ))}
        </SelectField>
        <SelectField
          label="A time marks"
          hint={hintOf('stamp')}
          value={mapping.stamp}
          onChange={(event) => set({ stamp: event.target.value === 'end' ? 'end' : 'start' })}
        >
          <option value="start">the start of its step</option>
          <option value="end">the end of its step</option>
        </SelectField>
        <SelectField
          label="Decimal mark"
          hint={hintOf('decimalMark')}
          value={mapping.decimalMark}
          onChange={(event) => set({ decimalMark: event.target.value === ',' ? ',' : '.' })}
        >
          <option value=".">point, as in 1.5</option>
          <option value=",">comma, as in 1,5</option>
        </SelectField>
        <Field
          label="Time zone of the times"
          hint={hintOf('timeZone') ?? 'Used where the times carry no offset.'}
          list="zones"
          spellCheck={false}
          value={mapping.timeZone}
          onChange={(event) => set({ timeZone: event.target.value.trim() })}
        />
        <Field
          label="Head row"
          hint="0 if the file has none."
          inputMode="numeric"
          type="number"
          min={0}
          value={mapping.headerRow}
          onChange={(event) => set({ headerRow: Math.max(0, Math.trunc(Number(event.target.value) || 0)) })}
        />
        <datalist id="zones">
          {Intl.supportedValuesOf('timeZone').map((zone) => (
            <option key={zone} value={zone} />
          ))}
          <option value="UTC" />
        </datalist>
      </div>
      {change.isError && (
        <p role="alert" className="field-error mt-3">
          {errorWords(change.error)}
        </p>
      )}
      <p className="mt-4">
        <Button type="submit" look="plain" busy={change.isPending}>
          Read it again this way
        </Button>
      </p>
    </form>
  );
}
