import { type KeyboardEvent, useEffect, useId, useState } from 'react';
import type { StatementBody } from '#shared/api/cycles.ts';
import type { ReadField } from './read-fields.ts';
import type { ReadValue } from './read-values.ts';
import { Mark } from './source-view.tsx';

const TONES = { ok: 'mark-ok', no: 'mark-no', wait: 'mark-wait' } as const;

/** One value that was read: label, field or pair of fields, verdict, and its note where it needs an eye. */
export function ValueRow({
  value,
  mark,
  onFocus,
  onChange,
}: {
  value: ReadValue;
  mark: number | null;
  onFocus: (rows: number[]) => void;
  onChange: (statement: StatementBody) => void;
}) {
  const pair = value.fields.length > 1;
  return (
    <fieldset
      className={`-mx-3 min-w-0 border-b px-3 ${value.total ? 'border-b-4 border-double border-ink font-bold' : 'border-rule'} ${value.doubtful ? 'bg-doubt' : ''}`}
      onFocus={() => onFocus(value.rows)}
    >
      <div className="grid grid-cols-[26px_1fr_auto] items-center gap-x-2 py-1.5 sm:grid-cols-[26px_1fr_auto_104px]">
        <span>{mark === null ? null : <Mark number={mark} />}</span>
        <span className={value.doubtful ? 'font-semibold' : ''}>{value.label}</span>
        <span
          className={`text-right sm:order-last sm:pl-1.5 sm:text-left ${value.tone ? TONES[value.tone] : ''} whitespace-normal!`}
        >
          {value.verdict}
        </span>
        <span
          className={`col-span-2 col-start-2 flex items-center gap-1.5 sm:col-span-1 sm:col-start-auto ${pair ? 'sm:w-[310px]' : 'sm:w-[150px]'} sm:justify-self-end`}
        >
          {value.fields.map((field, index) => (
            <span key={field.name} className="flex min-w-0 flex-1 items-center gap-1.5">
              {index > 0 && <span className="text-soft">→</span>}
              <ValueField field={field} strong={value.total} onChange={onChange} />
            </span>
          ))}
        </span>
      </div>
      {value.notes.map((note) => (
        <p key={note} className="hint pb-2.5 pl-[34px] font-normal">
          {note}
        </p>
      ))}
    </fieldset>
  );
}

function ValueField({
  field,
  strong,
  onChange,
}: {
  field: ReadField;
  strong: boolean;
  onChange: (statement: StatementBody) => void;
}) {
  const id = useId();
  const [text, setText] = useState(field.text);
  const [fault, setFault] = useState<string | null>(null);
  useEffect(() => {
    setText(field.text);
    setFault(null);
  }, [field.text]);
  const settle = () => {
    if (text.trim() === field.text) return setFault(null);
    const made = field.put(text);
    if (typeof made === 'string') return setFault(made);
    setFault(null);
    onChange(made);
  };
  const onKey = (event: KeyboardEvent) => {
    if (event.key === 'Enter') {
      event.preventDefault();
      settle();
    } else if (event.key === 'Escape') {
      setText(field.text);
      setFault(null);
    }
  };
  return (
    <span className="min-w-0 flex-1">
      <input
        id={id}
        aria-label={field.name}
        aria-invalid={fault ? true : undefined}
        aria-describedby={fault ? `${id}-fault` : undefined}
        className={`input input-number mt-0! px-2! ${strong ? 'font-bold' : ''} ${field.type === 'date' ? 'max-sm:px-1! max-sm:text-[15px]!' : ''}`}
        type={field.type === 'date' ? 'date' : 'text'}
        inputMode={field.type === 'number' ? 'decimal' : 'text'}
        value={text}
        onChange={(event) => setText(event.target.value)}
        onBlur={settle}
        onKeyDown={onKey}
      />
      {fault && (
        <span id={`${id}-fault`} role="alert" className="field-error">
          {fault}
        </span>
      )}
    </span>
  );
}
