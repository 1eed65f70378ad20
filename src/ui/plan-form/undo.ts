import { useRef } from 'react';
import type { PlanForm } from './plan-form.ts';

/** What a question's other answer held, as long as nothing else was changed since: choosing it again brings everything typed for it back. */
export function useKeptAnswers(form: PlanForm): {
  /** The form for an answer left before, or null where it was never given or the form has changed since. */
  kept(answer: string): PlanForm | null;
  /** Remembers what an answer held before the form became another. */
  keep(answer: string, after: PlanForm): PlanForm;
} {
  const answers = useRef(new Map<string, { before: PlanForm; after: string }>());
  return {
    kept(answer) {
      const one = answers.current.get(answer);
      return one && one.after === JSON.stringify(form) ? one.before : null;
    },
    keep(answer, after) {
      answers.current.set(answer, { before: form, after: JSON.stringify(after) });
      return after;
    },
  };
}
