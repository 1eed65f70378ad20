import { useState } from 'react';
import { TextArea } from '../field.tsx';
import type { FormFault } from './edit.ts';
import { PlanQuestions } from './plan-questions.tsx';
import { type PlanText, questionsCanSay, writtenAs } from './plan-text.ts';

/** What a plan says, by questions or as JSON. `faults` and `refused` (the server's) are by path within it. */
export function PlanTextFields<T extends PlanText>({
  text,
  onChange,
  timeZone,
  faults,
  refused,
  showAll,
  prefix,
  bare = false,
}: {
  text: T;
  onChange: (text: T) => void;
  timeZone: string;
  faults: readonly FormFault[];
  refused: readonly FormFault[];
  showAll: boolean;
  prefix: string;
  bare?: boolean;
}) {
  const [left, setLeft] = useState(false);
  const json = showAll || left ? faults.find(({ path }) => path === 'json')?.message : undefined;
  return (
    <>
      {text.written === 'questions' ? (
        <PlanQuestions
          form={text.form}
          onChange={(form) => onChange({ ...text, form })}
          faults={within(faults, 'form.')}
          refused={refused}
          showAll={showAll}
          prefix={`${prefix}.form`}
          bare={bare}
        />
      ) : (
        <TextArea
          label="The plan, written as JSON"
          hint={
            questionsCanSay(text.json)
              ? 'Change or paste it here.'
              : 'This plan says more than the questions can. It is kept as it is; change or paste it here.'
          }
          rows={16}
          spellCheck={false}
          style={{ fontFamily: 'ui-monospace, monospace', fontSize: '14px' }}
          name={`${prefix}.json`}
          value={text.json}
          error={json ?? (refused.length > 0 ? refused.map(({ message }) => message).join(' ') : undefined)}
          onChange={(event) => onChange({ ...text, json: event.target.value })}
          onBlur={() => setLeft(true)}
        />
      )}
      <p className="mt-4">
        <button
          type="button"
          className="link hint min-h-11"
          onClick={() => onChange(writtenAs(text, text.written === 'questions' ? 'json' : 'questions', timeZone))}
        >
          {text.written === 'questions' ? 'Write this plan as JSON instead' : 'Answer questions instead'}
        </button>
      </p>
    </>
  );
}

/** The faults below a path, by what follows it. */
export function within(faults: readonly FormFault[], path: string): FormFault[] {
  return faults
    .filter((fault) => fault.path.startsWith(path))
    .map((fault) => ({ ...fault, path: fault.path.slice(path.length) }));
}
