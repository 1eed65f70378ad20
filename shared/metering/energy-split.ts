import * as z from 'zod/mini';
import { splitWhole } from '../units/split.ts';

const wholes = z.array(z.int());

/**
 * How a cycle's energy fell on the periods of its plan, in the calendar's order (one figure where it has none), in Wh. `cancels`: what of import export cancelled inside
 * clock hours and quarter-hours, period by period. Null where it was not measured.
 */
export const energySplit = z.object({
  importWh: wholes,
  exportWh: wholes,
  selfWh: z.nullable(wholes),
  cancels: z.object({ hour: z.nullable(wholes), '15min': z.nullable(wholes) }),
});
export type EnergySplit = z.infer<typeof energySplit>;

/** Weights by which a span's energy is shared out between periods. None is negative. */
export type Shares = {
  /** Whether the span has hours of the period at all. */
  present: readonly boolean[];
  /** Null: import is what use leaves over self-use. */
  import: readonly number[] | null;
  export: readonly number[];
  self: readonly number[];
  use: readonly number[];
  /** Millionths of the lesser of import and export. */
  cancels: Record<'hour' | '15min', readonly number[]>;
};

/** Use at stated hours beside what is shared out: what of it is bought, what the roof meets, and weights for both. */
export type AtHours = { importWh: number; selfWh: number; weights: readonly number[] };

export type SplitFlow = { importWh: number; exportWh: number };

/** A span's energy by period, in Wh. Sums are exact: the parts of each add up to what was shared out, and use = import + production − export part by part. */
export type SplitEnergy = {
  importWh: number[];
  exportWh: number[];
  productionWh: number[];
  useWh: number[];
  netted: Record<'hour' | '15min', { total: SplitFlow; parts: SplitFlow[] }>;
};

const MILLION = 1_000_000;

/** Shares out what is bought, sent out and made (Wh). */
export function splitEnergy(
  energy: { importWh: number; exportWh: number; productionWh: number; useWh: number },
  shares: Shares,
  atHours: AtHours | null = null,
): SplitEnergy {
  const self = energy.useWh - energy.importWh;
  const selfWh = splitWhole(self - (atHours?.selfWh ?? 0), shares.self);
  const bought = energy.importWh - (atHours?.importWh ?? 0);
  const importWh = splitWhole(bought, shares.import ?? leftOver(bought, selfWh, shares.use));
  if (atHours) {
    addParts(selfWh, splitWhole(atHours.selfWh, atHours.weights));
    addParts(importWh, splitWhole(atHours.importWh, atHours.weights));
  }
  // What the roof makes beside self-use is sent out; less of it where a projection takes export away.
  const sent = splitWhole(energy.productionWh - self, shares.export);
  const exportWh = energy.productionWh - self === energy.exportWh ? sent : splitWhole(energy.exportWh, shares.export);
  return {
    importWh,
    exportWh,
    productionWh: selfWh.map((own, at) => own + Number(sent[at])),
    useWh: selfWh.map((own, at) => own + Number(importWh[at])),
    netted: {
      hour: netted(importWh, exportWh, shares.cancels.hour),
      '15min': netted(importWh, exportWh, shares.cancels['15min']),
    },
  };
}

/** Weights of import where only use and self-use have a shape: use less self-use, where that is above zero. */
function leftOver(bought: number, selfWh: readonly number[], use: readonly number[]): readonly number[] {
  const used = splitWhole(bought + selfWh.reduce((sum, own) => sum + own, 0), use);
  const left = used.map((value, at) => Math.max(0, value - Number(selfWh[at])));
  return left.some((value) => value > 0) ? left : use;
}

function addParts(to: number[], more: readonly number[]): void {
  for (const [at, value] of more.entries()) to[at] = Number(to[at]) + value;
}

function netted(importWh: readonly number[], exportWh: readonly number[], cancels: readonly number[]) {
  const total: SplitFlow = { importWh: 0, exportWh: 0 };
  const parts = importWh.map((bought, at): SplitFlow => {
    const sent = Number(exportWh[at]);
    const lesser = Math.max(0, Math.min(bought, sent));
    const gone = Math.min(lesser, Math.round((lesser * Number(cancels[at])) / MILLION));
    const part = { importWh: bought - gone, exportWh: sent - gone };
    total.importWh += part.importWh;
    total.exportWh += part.exportWh;
    return part;
  });
  return { total, parts };
}
