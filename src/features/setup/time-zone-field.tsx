import type { ComponentProps } from 'react';
import { SelectField } from '#src/ui/field.tsx';

const UNITED_STATES: { zone: string; name: string }[] = [
  { zone: 'America/New_York', name: 'Eastern' },
  { zone: 'America/Chicago', name: 'Central' },
  { zone: 'America/Denver', name: 'Mountain' },
  { zone: 'America/Phoenix', name: 'Mountain, no daylight saving (Arizona)' },
  { zone: 'America/Los_Angeles', name: 'Pacific' },
  { zone: 'America/Anchorage', name: 'Alaska' },
  { zone: 'Pacific/Honolulu', name: 'Hawaii' },
  { zone: 'America/Puerto_Rico', name: 'Atlantic (Puerto Rico)' },
];
const NAMED = new Set(UNITED_STATES.map((one) => one.zone));
const OTHERS = Intl.supportedValuesOf('timeZone').filter((zone) => !NAMED.has(zone));

/** The zone this device is set to, as a first guess. */
export function guessedTimeZone(): string {
  return Intl.DateTimeFormat().resolvedOptions().timeZone || 'America/Chicago';
}

/** A household's time zone: the United States by name, the rest of the world by IANA name. */
export function TimeZoneField({
  current,
  ...rest
}: { current: string; error?: string | undefined } & ComponentProps<'select'>) {
  const strange = current !== '' && !NAMED.has(current) && !OTHERS.includes(current);
  return (
    <SelectField {...rest} label="Time zone" hint="Days of your production file begin at midnight here.">
      {strange && <option value={current}>{current}</option>}
      <optgroup label="United States">
        {UNITED_STATES.map((one) => (
          <option key={one.zone} value={one.zone}>
            {one.name}
          </option>
        ))}
      </optgroup>
      <optgroup label="Elsewhere">
        {OTHERS.map((zone) => (
          <option key={zone} value={zone}>
            {zone.replaceAll('_', ' ')}
          </option>
        ))}
      </optgroup>
    </SelectField>
  );
}
