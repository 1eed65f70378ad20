import type { Cents } from '#shared/units/cents.ts';
import type { Wh } from '#shared/units/energy.ts';
import { decimal, kwh, MISSING, money } from '#src/lib/format.ts';

/** Money in a table: cents, a true minus, and colour beside the sign. Missing is a dash with its reason on focus, never zero. */
export function Money({ cents, missing }: { cents: Cents | null; missing?: string }) {
  if (cents === null) return <Missing reason={missing ?? 'Not known'} />;
  return <span className={cents < 0 ? 'neg whitespace-nowrap' : 'whitespace-nowrap'}>{money(cents)}</span>;
}

export function Kwh({ wh, missing }: { wh: Wh | null; missing?: string }) {
  if (wh === null) return <Missing reason={missing ?? 'Not known'} />;
  return <span>{kwh(wh)}</span>;
}

export function DecimalText({ text }: { text: string | null }) {
  return text === null ? null : <span>{decimal(text)}</span>;
}

export function Missing({ reason }: { reason: string }) {
  return (
    <abbr title={reason} className="no-underline" aria-label={reason}>
      {MISSING}
    </abbr>
  );
}
