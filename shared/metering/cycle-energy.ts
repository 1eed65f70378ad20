import type { ReadChannel } from '../facts/papers.ts';
import type { CycleEnergy, EnergyFigure } from '../ledger/cycle.ts';
import type { CyclePaper } from '../ledger/cycle-papers.ts';
import { kwhText, wh } from '../units/energy.ts';
import { type ChannelWitnesses, channelWitnesses, chosenEnergy } from './channel-energy.ts';
import { type EstimatedRun, runKey } from './estimated-reads.ts';
import { COMPLETE_COVERAGE, type IntervalIndex, type IntervalReading, intervalEnergy } from './interval-index.ts';
import { input, ownFigure } from './source.ts';

/** What is known of a cycle's energy, and from whom. */
export type MeteredCycle = {
  witnesses: Record<ReadChannel, ChannelWitnesses>;
  monitor: IntervalReading | null;
  energy: CycleEnergy;
};

/** What every witness says of the cycles, before it is decided whom to believe. */
export type WitnessedCycle = Omit<MeteredCycle, 'energy'>;

export function witnessCycle(paper: CyclePaper, index: IntervalIndex): WitnessedCycle {
  return {
    witnesses: {
      import: channelWitnesses(paper, index, 'import'),
      export: channelWitnesses(paper, index, 'export'),
      production: channelWitnesses(paper, index, 'production'),
    },
    monitor: intervalEnergy(index, 'monitor', paper.from, paper.to),
  };
}

/**
 * The energy of a cycle: each channel from register, printed kWh or interval data (`chosenEnergy`), production failing those from the
 * inverter's monitoring; self-use = production − export and use = import + self-use where all parts are complete (no storage;
 * net-metering.md §5). Missing stays null.
 */
export function meterCycle(
  paper: CyclePaper,
  witnessed: readonly WitnessedCycle[],
  runs: ReadonlyMap<string, EstimatedRun>,
): MeteredCycle {
  const own = witnessed[paper.index];
  if (!own) throw new RangeError(`no witnesses for cycle ${paper.index}`);
  const chosen = (channel: ReadChannel): EnergyFigure | null => {
    const run = runs.get(runKey(paper.index, channel));
    return chosenEnergy(
      own.witnesses[channel],
      paper.split !== null,
      run !== undefined && standsTogether(run, witnessed),
    );
  };
  const importing = chosen('import');
  const exporting = chosen('export');
  const production = chosen('production') ?? own.monitor?.figure ?? null;
  const selfUse = isComplete(production) && isComplete(exporting) ? selfUseOf(production, exporting) : null;
  return {
    ...own,
    energy: {
      import: importing,
      export: exporting,
      production,
      selfUse,
      use: selfUse && isComplete(importing) ? useOf(importing, selfUse) : null,
    },
  };
}

/** What the registers and the complete interval data give over a run of cycles joined by estimated reads; null where either lacks a cycle. */
export function runTotals(
  run: EstimatedRun,
  witnessed: readonly WitnessedCycle[],
): { registerWh: number; intervalsWh: number; toleranceWh: number } | null {
  const totals = { registerWh: 0, intervalsWh: 0, toleranceWh: 0 };
  for (const cycle of run.cycles) {
    const seen = witnessed[cycle]?.witnesses[run.channel];
    if (!seen?.register || !seen.intervals?.complete) return null;
    totals.registerWh += seen.register.wh;
    totals.intervalsWh += seen.intervals.figure.wh;
    totals.toleranceWh = Math.max(totals.toleranceWh, seen.toleranceWh, Math.floor(totals.intervalsWh / 100));
  }
  return totals;
}

/** Whether a run's reads stand as billed: while its actual read is awaited, and after it where the sum agrees with the interval data. */
export function standsTogether(run: EstimatedRun, witnessed: readonly WitnessedCycle[]): boolean {
  if (run.pending) return true;
  const totals = runTotals(run, witnessed);
  return totals === null || Math.abs(totals.registerWh - totals.intervalsWh) <= totals.toleranceWh;
}

/** Whether a figure covers its whole cycle and may be added to others. */
export function isComplete(figure: EnergyFigure | null): figure is EnergyFigure {
  return figure !== null && figure.coverage >= COMPLETE_COVERAGE;
}

function selfUseOf(production: EnergyFigure, exporting: EnergyFigure): EnergyFigure {
  return {
    wh: wh(production.wh - exporting.wh),
    from: 'computed',
    coverage: Math.min(production.coverage, exporting.coverage),
    working: {
      words: `${kwhText(production.wh)} kWh made − ${kwhText(exporting.wh)} kWh sent out`,
      formula: 'production - export',
      inputs: [
        input('production', 'Production', kwhText(production.wh), 'kWh', ownFigure('production of the cycle')),
        input('export', 'Export', kwhText(exporting.wh), 'kWh', ownFigure('export of the cycle')),
      ],
      unit: 'kWh',
      basis: basisOf(production, exporting),
    },
  };
}

function useOf(importing: EnergyFigure, selfUse: EnergyFigure): EnergyFigure {
  return {
    wh: wh(importing.wh + selfUse.wh),
    from: 'computed',
    coverage: Math.min(importing.coverage, selfUse.coverage),
    working: {
      words: `${kwhText(importing.wh)} kWh bought + ${kwhText(selfUse.wh)} kWh used from the roof`,
      formula: 'import + selfUse',
      inputs: [
        input('import', 'Import', kwhText(importing.wh), 'kWh', ownFigure('import of the cycle')),
        input('selfUse', 'Self-use', kwhText(selfUse.wh), 'kWh', ownFigure('self-use of the cycle')),
      ],
      unit: 'kWh',
      basis: basisOf(importing, selfUse),
    },
  };
}

function basisOf(a: EnergyFigure, b: EnergyFigure): 'computed' | 'estimated' {
  return a.working.basis === 'estimated' || b.working.basis === 'estimated' ? 'estimated' : 'computed';
}
