import type { Cents } from '#shared/units/cents.ts';
import type { Working } from '#shared/working.ts';
import { money } from '#src/lib/format.ts';
import { Money } from './money.tsx';
import { FigureButton } from './working.tsx';

/** Money that opens its working, coloured by its sign; plain where there is no working. */
export function MoneyFigure({
  title,
  cents,
  working,
  quietZero,
}: {
  title: string;
  cents: Cents;
  working: Working | null;
  quietZero?: boolean;
}) {
  const tone = cents < 0 ? 'neg' : cents === 0 && quietZero ? 'text-soft' : undefined;
  if (working === null)
    return tone === 'text-soft' ? <span className={tone}>{money(cents)}</span> : <Money cents={cents} />;
  return <FigureButton title={title} text={money(cents)} working={working} className={tone} />;
}
