import { useState } from 'react';
import type { Fault } from '#shared/problem.ts';
import { faultWords } from './fault-words.ts';

/** How many faults of a file are listed at first. */
const FIRST = 8;

/** Faults of a file, each with its row and column and what to do. */
export function FaultList({ faults }: { faults: Fault[] }) {
  const [all, setAll] = useState(false);
  const shown = all ? faults : faults.slice(0, FIRST);
  return (
    <>
      <ul className="mt-2">
        {shown.map((fault, index) => {
          const { place, text } = faultWords(fault);
          return (
            // biome-ignore lint/suspicious/noArrayIndexKey: the list does not change while it is shown
            <li key={index} className="border-t border-rule py-2">
              {place !== null && <b className="mr-3 inline!">{place}</b>}
              {text}
              {fault.found !== null && fault.found !== '' && !fault.message.includes(fault.found) && (
                <span className="hint block">Found: “{fault.found}”</span>
              )}
            </li>
          );
        })}
      </ul>
      {!all && faults.length > FIRST && (
        <button type="button" className="link min-h-11" onClick={() => setAll(true)}>
          Show all {faults.length}
        </button>
      )}
    </>
  );
}
