import type { CreditView } from '#shared/api/credit.ts';
import { formAmount } from './credit-words.ts';

type Bar = {
  taxYear: number;
  before: number;
  used: number;
  carried: number;
  label: string;
  carriedLabel: string;
  planned: boolean;
};

/** How the credit is used up: one row a year, each starting where the one before ended. */
export function CreditBars({ view }: { view: CreditView }) {
  const total = view.earnedCents;
  const bars = barsOf(view);
  if (total <= 0 || bars.length === 0) return null;
  const percent = (amount: number) => `${(amount / total) * 100}%`;
  return (
    <div className="mt-5 flex flex-col gap-2.5" aria-hidden="true">
      {bars.map((bar) => (
        <div key={bar.taxYear} className="flex h-7 text-sm font-semibold" style={{ paddingLeft: percent(bar.before) }}>
          {bar.used > 0 && (
            <div
              className={`@container mr-0.5 flex items-center rounded-[2px] ${bar.planned ? 'hatch-credit text-ink' : 'bg-credit text-sheet'}`}
              style={{ width: percent((bar.used * total) / (total - bar.before)) }}
            >
              <span className="hidden whitespace-nowrap px-2.5 @min-[128px]:inline">{bar.label}</span>
              <span className="hidden px-2 @min-[48px]:inline @min-[128px]:hidden">{bar.taxYear}</span>
            </div>
          )}
          {bar.carried > 0 && (
            <div
              className="@container flex items-center rounded-[2px] bg-credit/20"
              style={{ width: percent((bar.carried * total) / (total - bar.before)) }}
            >
              <span className="hidden whitespace-nowrap px-2.5 @min-[156px]:inline">{bar.carriedLabel}</span>
            </div>
          )}
        </div>
      ))}
    </div>
  );
}

function barsOf(view: CreditView): Bar[] {
  const bars: Bar[] = [];
  let before = 0;
  for (const [index, line] of view.lines.entries()) {
    if (line.line15Cents === null || line.line16Cents === null) break;
    if (line.line15Cents === 0 && line.line16Cents === 0) continue;
    const planned =
      (view.credit?.years.find((year) => year.taxYear === line.taxYear)?.status ?? 'planned') === 'planned';
    const next = view.lines[index + 1]?.taxYear;
    bars.push({
      taxYear: line.taxYear,
      before,
      used: line.line15Cents,
      carried: line.line16Cents,
      label: planned ? `${line.taxYear} planned` : `${line.taxYear} used ${formAmount(line.line15Cents)}`,
      carriedLabel: next
        ? `carried to ${next}, ${formAmount(line.line16Cents)}`
        : `carried, ${formAmount(line.line16Cents)}`,
      planned,
    });
    before += line.line15Cents;
  }
  return bars;
}
