import { useRef } from 'react';
import { Button } from '#src/ui/button.tsx';
import type { PlanEntry } from '#src/ui/plan-form/plan-entry.ts';
import { entryOfText } from './plan-file.ts';

/** Takes a plan in from a JSON file, into the editor: nothing is saved until it is looked at. */
export function TakeInPlan({ from, take }: { from: string; take: (start: PlanEntry) => void }) {
  const file = useRef<HTMLInputElement>(null);
  return (
    <>
      <Button look="plain" onClick={() => file.current?.click()}>
        Take in a plan from a file
      </Button>
      <input
        ref={file}
        type="file"
        accept=".json,application/json"
        className="visually-hidden"
        tabIndex={-1}
        aria-label="A plan as a JSON file"
        onChange={async (event) => {
          const chosen = event.target.files?.[0];
          event.target.value = '';
          if (chosen) take(entryOfText(await chosen.text(), from));
        }}
      />
    </>
  );
}
