import { useState } from 'react';
import { useParams } from 'react-router-dom';
import { creditApi } from '#shared/api/credit.ts';
import type { Source, Working } from '#shared/working.ts';
import { addressOf } from '#src/lib/api.ts';
import { decimal, decimalDollars } from '#src/lib/format.ts';

export type ShownWorking = { title: string; figure: string; working: Working };

const BASIS: Record<Working['basis'], string> = {
  billed: 'As billed.',
  metered: 'Measured by a meter.',
  computed: 'Computed.',
  estimated: 'An estimate.',
  entered: 'Entered by a person.',
};

/** A figure with what it was worked out from, each input with its source. */
export function WorkingBody({ shown, close }: { shown: ShownWorking; close: () => void }) {
  const { working } = shown;
  return (
    <>
      <div className="flex items-baseline justify-between gap-6">
        <h2 id="working-title">{shown.title}</h2>
        <button type="button" className="link min-h-11" onClick={close}>
          Close
        </button>
      </div>
      <p className="mt-1 text-2xl font-semibold">{shown.figure}</p>
      <p className="mt-2">{working.words}</p>
      <p className="hint">{BASIS[working.basis]}</p>
      {working.inputs.map((input) => (
        <InputRows key={input.name} input={input} />
      ))}
    </>
  );
}

/** How many figures of a long list are shown at first. */
const SHORT_LIST = 40;

function InputRows({ input }: { input: Working['inputs'][number] }) {
  const [all, setAll] = useState(false);
  const values = Array.isArray(input.value) ? input.value : [input.value];
  const shownValues = all ? values : values.slice(0, SHORT_LIST);
  return (
    <div className="mt-3 border-t border-rule pt-2">
      <div className="flex justify-between gap-5">
        <span>{input.label}</span>
        {values.length === 1 && <span className="whitespace-nowrap">{withUnit(values[0] ?? '', input.unit)}</span>}
      </div>
      {values.length !== 1 && (
        <ul className="mt-1 grid grid-cols-2 gap-x-6 text-right sm:grid-cols-3">
          {shownValues.map((value, index) => (
            // biome-ignore lint/suspicious/noArrayIndexKey: the list never changes while it is shown
            <li key={index}>{withUnit(value, input.unit)}</li>
          ))}
        </ul>
      )}
      {!all && values.length > SHORT_LIST && (
        <button type="button" className="link" onClick={() => setAll(true)}>
          Show all {values.length}
        </button>
      )}
      <p className="hint">
        {sourceWords(input.source)} <PaperDownload source={input.source} />
      </p>
    </div>
  );
}

/** The paper an input was taken from, to take away as it came. Asked for at the one address that every role may ask. */
function PaperDownload({ source }: { source: Source }) {
  const { householdId } = useParams();
  if (source.kind !== 'document' || householdId === undefined) return null;
  return (
    <a
      className="link no-print inline-flex min-h-11 items-center sm:min-h-6"
      href={addressOf(creditApi.paper, { householdId, documentId: source.documentId })}
      download={source.fileName}
    >
      Take the paper
    </a>
  );
}

function withUnit(value: string, unit: string): string {
  if (unit === 'USD') return decimalDollars(value);
  if (unit === 'USD/kWh') return `${decimalDollars(value)} per kWh`;
  const text = decimal(value);
  return unit === '' || unit === 'fraction' ? text : `${text} ${unit}`;
}

/** Where an input comes from, in words. */
export function sourceWords(source: Source): string {
  switch (source.kind) {
    case 'document':
      return `${source.fileName}, ${source.place}`;
    case 'typed':
      return `Typed by ${source.by} on ${source.on}`;
    case 'rule':
      return source.version === '' ? source.name : `${source.name}, ${source.version}`;
    case 'figure':
      return `From ${source.name}`;
  }
}
