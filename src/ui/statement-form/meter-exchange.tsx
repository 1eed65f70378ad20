import { useState } from 'react';
import { Button } from '#src/ui/button.tsx';
import { Field, SelectField } from '#src/ui/field.tsx';
import { exchangedReads } from './exchange-reads.ts';
import { type Form, Three } from './fields-row.tsx';
import type { ReadRow } from './statement-values.ts';

/** "The meter was exchanged": splits the old meter's registers at the day and lays out those of the new one. */
export function MeterExchange({ form, onAdd }: { form: Form; onAdd: (reads: ReadRow[]) => void }) {
  const [open, setOpen] = useState(false);
  const [old, setOld] = useState('');
  const [fresh, setFresh] = useState('');
  const [on, setOn] = useState('');
  const [tried, setTried] = useState(false);
  const [reads, from, to] = form.watch(['reads', 'from', 'to']);
  const meters = [...new Set(reads.map((read) => read.meter).filter((meter) => meter !== ''))];
  if (meters.length === 0) return null;
  const chosen = meters.includes(old) ? old : (meters[0] ?? '');
  const wrongDay = on === '' ? 'Choose a date.' : outside(on, from, to) ? 'The day lies outside the cycle.' : null;
  const wrongMeter =
    fresh.trim() === ''
      ? 'Write the new meter’s number.'
      : meters.includes(fresh.trim())
        ? 'This number is here already.'
        : null;
  const add = () => {
    setTried(true);
    if (wrongDay !== null || wrongMeter !== null) return;
    onAdd(exchangedReads(reads, chosen, fresh.trim(), on));
    setOpen(false);
    setFresh('');
    setOn('');
    setTried(false);
  };
  if (!open) {
    return (
      <button type="button" className="link hint min-h-11" onClick={() => setOpen(true)}>
        The meter was exchanged
      </button>
    );
  }
  return (
    <fieldset className="min-w-0 border-t border-rule pt-2">
      <legend className="visually-hidden">The meter was exchanged</legend>
      <p className="hint">
        Each register is then read twice: the old meter to its last figure, the new one from its first. Both stand on
        the statement or on the card the utility left.
      </p>
      <Three>
        <SelectField label="Old meter" value={chosen} onChange={(event) => setOld(event.target.value)}>
          {meters.map((meter) => (
            <option key={meter} value={meter}>
              {meter}
            </option>
          ))}
        </SelectField>
        <Field
          label="Exchanged on"
          type="date"
          value={on}
          error={tried ? (wrongDay ?? undefined) : undefined}
          onChange={(event) => setOn(event.target.value)}
        />
        <Field
          label="New meter’s number"
          value={fresh}
          error={tried ? (wrongMeter ?? undefined) : undefined}
          onChange={(event) => setFresh(event.target.value)}
        />
      </Three>
      <p className="mt-3 flex flex-wrap items-center gap-5">
        <Button look="plain" onClick={add}>
          Add its reads
        </Button>
        <button type="button" className="link min-h-11" onClick={() => setOpen(false)}>
          Back without it
        </button>
      </p>
    </fieldset>
  );
}

function outside(on: string, from: string, to: string): boolean {
  return (from !== '' && on <= from) || (to !== '' && on >= to);
}
