import { useState } from 'react';
import { Field, TextArea } from '../field.tsx';
import type { FormFault } from './edit.ts';
import { entryFaults, holdingFrom, type PlanEntry, questionsCanSay, writtenAs } from './plan-entry.ts';
import { PlanQuestions } from './plan-questions.tsx';

/** A plan of a household: since when, and what it says. Used wherever a plan is written. */
export function PlanEntryFields({
  entry,
  onChange,
  timeZone,
  refused = [],
  showAll,
  prefix,
}: {
  entry: PlanEntry;
  onChange: (entry: PlanEntry) => void;
  timeZone: string;
  /** The server's faults, by path in the plan. */
  refused?: readonly FormFault[];
  showAll: boolean;
  prefix: string;
}) {
  const [left, setLeft] = useState<string[]>([]);
  const faults = entryFaults(entry);
  const error = (path: string) =>
    showAll || left.includes(path) ? faults.find((fault) => fault.path === path)?.message : undefined;
  return (
    <>
      <Field
        label="Holds from"
        hint="It starts with the first cycle that begins on or after this day; cycles before the first plan use the first."
        type="date"
        className="max-w-[220px]"
        name={`${prefix}.from`}
        value={entry.from}
        error={error('from')}
        onChange={(event) => onChange(holdingFrom(entry, event.target.value))}
        onBlur={() => setLeft([...left, 'from'])}
      />
      {entry.written === 'questions' ? (
        <PlanQuestions
          form={entry.form}
          onChange={(form) => onChange({ ...entry, form })}
          faults={faults
            .filter(({ path }) => path.startsWith('form.'))
            .map(({ path, message }) => ({ path: path.slice('form.'.length), message }))}
          refused={refused}
          showAll={showAll}
          prefix={`${prefix}.form`}
        />
      ) : (
        <TextArea
          label="The plan, written as JSON"
          hint={
            questionsCanSay(entry.json)
              ? 'Change or paste it here.'
              : 'This plan says more than the questions can. It is kept as it is; change or paste it here.'
          }
          rows={16}
          spellCheck={false}
          style={{ fontFamily: 'ui-monospace, monospace', fontSize: '14px' }}
          name={`${prefix}.json`}
          value={entry.json}
          error={error('json')}
          onChange={(event) => onChange({ ...entry, json: event.target.value })}
          onBlur={() => setLeft([...left, 'json'])}
        />
      )}
      <p className="mt-4">
        <button
          type="button"
          className="link hint min-h-11"
          onClick={() => onChange(writtenAs(entry, entry.written === 'questions' ? 'json' : 'questions', timeZone))}
        >
          {entry.written === 'questions' ? 'Write this plan as JSON instead' : 'Answer questions instead'}
        </button>
      </p>
      {entry.withoutRoof !== '' && (
        <p className="hint">The plan this house would have without a roof is stated too, and kept.</p>
      )}
    </>
  );
}
