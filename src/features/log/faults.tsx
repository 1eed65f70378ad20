import { useState } from 'react';
import type { Fault } from '#shared/problem.ts';

/** How many faults of a file are listed at first. */
const FIRST = 8;

/** Faults of a file, each with its row and column and what to do. */
export function FaultList({ faults }: { faults: Fault[] }) {
  const [all, setAll] = useState(false);
  const shown = all ? faults : faults.slice(0, FIRST);
  return (
    <>
      <ul className="mt-2">
        {shown.map((fault, index) => (
          // biome-ignore lint/suspicious/noArrayIndexKey: the list does not change while it is shown
          <li key={index} className="border-t border-rule py-2">
            <FaultText fault={fault} />
            {fault.found !== null && fault.found !== '' && !fault.message.includes(fault.found) && (
              <span className="hint block">Found: “{fault.found}”</span>
            )}
          </li>
        ))}
      </ul>
      {!all && faults.length > FIRST && (
        <button type="button" className="link min-h-11" onClick={() => setAll(true)}>
          Show all {faults.length}
        </button>
      )}
    </>
  );
}

/** The place in front of what is wrong; a message that names its row itself is not made to say it twice. */
function FaultText({ fault }: { fault: Fault }) {
  const named = /^Row \d+(?:, [^:“]+)?: (.)/.exec(fault.message);
  if (!named && /^Row \d/.test(fault.message)) return fault.message;
  const text = named ? fault.message.slice(named[0].length - 1) : fault.message;
  return (
    <>
      <b className="mr-3 inline!">{placeOf(fault)}</b>
      {text.charAt(0).toUpperCase() + text.slice(1)}
    </>
  );
}

function placeOf(fault: Fault): string {
  const row = fault.row === null ? '' : `Row ${fault.row}`;
  const column = fault.column === null ? '' : fault.column;
  return [row, column].filter(Boolean).join(', ') || 'The file';
}
