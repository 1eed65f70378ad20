import { addDays, type Day, daysBetween } from '../units/day.ts';
import type { WorkingInput } from '../working.ts';
import type { Cycle } from './cycle-flows.ts';
import { type Basis, basisInput } from './energy-figures.ts';
import { energyPieces } from './energy-pieces.ts';
import type { EnergyItem } from './energy-share.ts';
import type { Piece } from './piece.ts';
import { roundToWhole, times } from './quantity.ts';

/**
 * The pieces of a credit that is earned in a term only, both days counted. kWh are shared by days between what lies in the term and what does not;
 * under `rateChangeBy: readDate` the day of `to` says all or nothing.
 */
export function termPieces(cycle: Cycle, item: EnergyItem, term: { firstDay: Day; lastDay: Day }): Piece[] {
  const pieces = energyPieces(cycle, item);
  const end = addDays(term.lastDay, 1);
  const byRead = cycle.prepared.plan.rateChangeBy === 'readDate';
  return pieces.map((piece) => {
    const { part } = piece;
    const read = cycle.to >= term.firstDay && cycle.to <= term.lastDay;
    const days = byRead ? (read ? part.days : 0) : daysInBoth(part, { from: term.firstDay, to: end });
    return days === part.days ? piece : within(cycle, piece, days, item.basis);
  });
}

/** Days that two spans share. */
export function daysInBoth(a: { from: Day; to: Day }, b: { from: Day; to: Day }): number {
  const [, from] = [a.from, b.from].sort();
  const [to] = [a.to, b.to].sort();
  return from !== undefined && to !== undefined && from < to ? daysBetween(from, to) : 0;
}

function within(cycle: Cycle, piece: Piece, days: number, basis: Basis): Piece {
  const { part } = piece;
  const source = { kind: 'figure', name: 'days' } as const;
  const inputs: WorkingInput[] = [
    ...piece.inputs,
    { name: 'termDays', label: 'Days in the term', value: String(days), unit: 'days', source },
    { name: 'partDays', label: 'Days in all', value: String(part.days), unit: 'days', source },
  ];
  const n = times(piece.n, days);
  const d = times(piece.d, part.days);
  if (cycle.prepared.plan.rounding.kWh !== 'whole') {
    return { ...piece, n, d, formula: `${piece.formula} * termDays / partDays`, inputs };
  }
  const whole = roundToWhole(n, d);
  const kWh = basisInput('kWh', `kWh of ${days} of ${part.days} days, whole kWh`, whole, basis);
  return { ...piece, n: whole, d: 1, formula: `kWh * ${piece.price.formula}`, inputs: [kWh, ...piece.price.inputs] };
}
