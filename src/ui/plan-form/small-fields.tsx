import { type ReactNode, useId } from 'react';
import { MONTH_NAMES } from '#shared/units/words.ts';
import { SelectField } from '../field.tsx';
import { Tick, Ticks } from '../ticks.tsx';
import { hourWords } from './words.ts';

/** A select over words by value. */
export function WordSelect<T extends string>({
  label,
  hint,
  error,
  value,
  words,
  onChange,
}: {
  label: ReactNode;
  hint?: ReactNode;
  error?: string | undefined;
  value: T;
  words: readonly (readonly [T, string])[];
  onChange: (value: T) => void;
}) {
  return (
    <SelectField
      label={label}
      hint={hint}
      error={error}
      value={value}
      onChange={(event) => {
        const found = words.find(([one]) => one === event.target.value);
        if (found) onChange(found[0]);
      }}
    >
      {words.map(([one, text]) => (
        <option key={one} value={one}>
          {text}
        </option>
      ))}
    </SelectField>
  );
}

const DAYS = Array.from({ length: 31 }, (_, index) => String(index + 1).padStart(2, '0'));

/** A day that comes every year, "MM-DD". */
export function YearlyDay({
  label,
  value,
  onChange,
}: {
  label: string;
  value: string;
  onChange: (value: string) => void;
}) {
  const [month = '01', day = '01'] = value.split('-');
  const id = useId();
  return (
    <div className="field">
      <span id={id} className="field-label">
        {label}
      </span>
      <span className="flex gap-2">
        <select
          className="input"
          aria-label={`${label}, month`}
          value={month}
          onChange={(event) => onChange(`${event.target.value}-${day}`)}
        >
          {MONTH_NAMES.map((name, index) => (
            <option key={name} value={String(index + 1).padStart(2, '0')}>
              {name}
            </option>
          ))}
        </select>
        <select
          className="input max-w-24"
          aria-label={`${label}, day`}
          value={day}
          onChange={(event) => onChange(`${month}-${event.target.value}`)}
        >
          {DAYS.map((one) => (
            <option key={one} value={one}>
              {Number(one)}
            </option>
          ))}
        </select>
      </span>
    </div>
  );
}

const CLOCK = Array.from(
  { length: 49 },
  (_, index) => `${String(Math.floor(index / 2)).padStart(2, '0')}:${index % 2 ? '30' : '00'}`,
);

/** A time of day in half hours; one that a plan states more finely is kept as it is. */
export function ClockSelect({
  label,
  value,
  end,
  onChange,
}: {
  label: string;
  value: string;
  /** The end of a span: the day ends at midnight, and does not begin there. */
  end?: boolean;
  onChange: (value: string) => void;
}) {
  const half = end ? CLOCK.slice(1) : CLOCK.slice(0, -1);
  const options = half.includes(value) ? half : [...half, value].sort();
  return (
    <SelectField label={label} value={value} onChange={(event) => onChange(event.target.value)}>
      {options.map((clock) => (
        <option key={clock} value={clock}>
          {hourWords(clock)}
        </option>
      ))}
    </SelectField>
  );
}

/** Several of a list, ticked. */
export function TickList({
  legend,
  hint,
  error,
  options,
  ticked,
  onChange,
}: {
  legend: ReactNode;
  hint?: ReactNode;
  error?: string | undefined;
  options: readonly { value: string; label: string }[];
  ticked: readonly string[];
  onChange: (value: string, on: boolean) => void;
}) {
  return (
    <fieldset className="field">
      <legend className="field-label">{legend}</legend>
      {hint && <span className="field-hint">{hint}</span>}
      {error && <span className="field-error">{error}</span>}
      <Ticks>
        {options.map(({ value, label }) => (
          <Tick key={value} label={label} checked={ticked.includes(value)} onChange={(on) => onChange(value, on)} />
        ))}
      </Ticks>
    </fieldset>
  );
}
