import type { CreditView } from '#shared/api/credit.ts';
import { Sheet } from '#src/ui/sheet.tsx';

/** The form's own arithmetic, each with its figures and whether it agrees. */
export function ChecksSheet({ view }: { view: CreditView }) {
  if (view.checks.length === 0) return null;
  return (
    <Sheet title="Checks">
      <ul className="mt-2 border-t-2 border-ink">
        {view.checks.map((check) => (
          <li key={check.label} className="flex flex-wrap items-baseline gap-x-5 border-b border-rule py-2">
            <span className="grow">{check.label}</span>
            <span className="hint">{check.detail}</span>
            <CheckMark agrees={check.agrees} />
          </li>
        ))}
      </ul>
    </Sheet>
  );
}

function CheckMark({ agrees }: { agrees: boolean | null }) {
  if (agrees === null) return <span className="mark-wait">nothing to compare</span>;
  return <span className={agrees ? 'mark-ok' : 'mark-no'}>{agrees ? 'agrees' : 'differs'}</span>;
}
