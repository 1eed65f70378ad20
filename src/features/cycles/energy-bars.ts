import type { CycleEnergy, EnergyFigure } from '#shared/ledger/cycle.ts';

export type BarPart = {
  key: 'selfUse' | 'sentOut' | 'bought' | 'fromRoof' | 'made' | 'used';
  label: string;
  title: string;
  figure: EnergyFigure;
  /** Share of the whole scale, 0–1. */
  share: number;
};
export type EnergyBars = {
  /** Where the roof's bar begins: after what was bought. */
  offset: number;
  roof: BarPart[];
  house: BarPart[];
  /** Every part once, named under the bars: those too narrow for their own label always, the others where the screen is narrow. */
  legend: (BarPart & { narrow: boolean })[];
};

/** What a letter and the room around a label take of a bar a thousand pixels wide. */
const LETTER = 0.0066;
const ROOM = 0.022;

/** The share of the width at which a part can carry its own label on a desk ("used at home 1,028 kWh"). */
function labelShare(label: string): number {
  return (label.length + ' 1,028 kWh'.length) * LETTER + ROOM;
}

/**
 * The two bars on one scale. The house's begins with what was bought; the roof's begins where that ends, so that self-use stands exactly above
 * itself. Null when nothing is known to draw.
 */
export function energyBars(energy: CycleEnergy): EnergyBars | null {
  const { production, selfUse, use } = energy;
  const bought = energy.import;
  const sent = energy.export;
  const boughtWh = Math.max(bought?.wh ?? 0, 0);
  const roofWh = Math.max(production?.wh ?? 0, (selfUse?.wh ?? 0) + (sent?.wh ?? 0), sent?.wh ?? 0, 0);
  const scale = boughtWh + roofWh;
  if (scale <= 0) return null;
  const part = (key: BarPart['key'], label: string, title: string, figure: EnergyFigure | null): BarPart[] =>
    figure && figure.wh > 0 ? [{ key, label, title, figure, share: figure.wh / scale }] : [];
  const roof = selfUse
    ? [...part('selfUse', 'used at home', 'Self-use', selfUse), ...part('sentOut', 'sent out', 'Export', sent)]
    : production
      ? part('made', 'made', 'Production', production)
      : part('sentOut', 'sent out', 'Export', sent);
  const house = [
    ...part('bought', 'bought', 'Import', bought),
    ...(use && selfUse ? part('fromRoof', 'from the roof', 'Self-use', selfUse) : []),
  ];
  const legend = [...roof, ...house]
    .filter((one) => one.key !== 'fromRoof')
    .map((one) => ({ ...one, narrow: one.share < labelShare(one.label) }));
  return { offset: boughtWh / scale, roof, house, legend };
}

/** What is missing, in sentences. */
export function missingEnergy(energy: CycleEnergy): string[] {
  const lines: string[] = [];
  if (!energy.production) lines.push('No production is known for this cycle: log a production file or meter reads.');
  if (!energy.import)
    lines.push('No import is known for this cycle: the statement has neither a read nor a printed figure.');
  if (!energy.export) lines.push('No export is known for this cycle, so what was used at home is not known either.');
  return lines;
}
