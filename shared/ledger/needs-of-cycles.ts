import type { Check, CheckId } from '../reconcile/check.ts';
import { cents, subtractCents } from '../units/cents.ts';
import { parseKwh, ZERO_WH } from '../units/energy.ts';
import type { Cycle } from './cycle.ts';
import type { Need } from './need.ts';
import type { NeedsInput } from './needs.ts';
import { sayCount, sayDay, sayGap, sayKwh, sayMoney, sayMonth } from './say.ts';

/** Cycles with a difference nobody has accepted, the latest first. */
export function differingCycles({ assembled }: NeedsInput): Need[] {
  return assembled
    .map((one) => one.cycle)
    .filter((cycle) => cycle.state === 'differs')
    .reverse()
    .map((cycle) => {
      const due = cycle.checks.find((check) => check.check === 'amountDue' && check.verdict === 'differs');
      const first = cycle.checks.find((check) => check.verdict === 'differs' && check.accepted === null);
      return {
        key: `differs:${cycle.to}`,
        tone: 'bad' as const,
        title: due && cycle.oursDueCents !== null ? billTitle(cycle) : checkTitle(cycle, first),
        detail: quantityDetail(cycle) ?? due?.cause ?? first?.cause ?? first?.title ?? 'Look at its checks.',
        link: `cycles/${cycle.to}`,
      };
    });
}

/** Checks of what the house made and was paid for it, which no statement is to blame for. */
const NOT_THE_STATEMENT: ReadonlySet<CheckId> = new Set([
  'fileGaps',
  'productionAgainstMonitor',
  'productionAtNight',
  'productionExpected',
  'incentiveQuantity',
  'incentivePaid',
]);

/** "October’s export is credited 13 kWh short", or the name of the check that differs. */
function checkTitle(cycle: Cycle, check: Check | undefined): string {
  if (!check) return `${possessive(cycle)} statement differs`;
  const gap = check.difference === null ? null : parseKwh(check.difference);
  const named = { exportAgainstIntervals: 'export is credited', importAgainstIntervals: 'import is charged' };
  if (gap !== null && (check.check === 'exportAgainstIntervals' || check.check === 'importAgainstIntervals')) {
    return `${possessive(cycle)} ${named[check.check]} ${sayGap(gap)} kWh ${gap < 0 ? 'short' : 'over'}`;
  }
  const what = NOT_THE_STATEMENT.has(check.check) ? 'record' : 'statement';
  return `${possessive(cycle)} ${what} differs: ${check.title.charAt(0).toLowerCase()}${check.title.slice(1)}`;
}

/** "Billed 212 kWh exported; your meter and interval data agree on 256." Null where no billed quantity differs. */
function quantityDetail(cycle: Cycle): string | null {
  for (const [id, energy, word] of [
    ['exportAgainstIntervals', cycle.energy.export, 'exported'],
    ['importAgainstIntervals', cycle.energy.import, 'imported'],
  ] as const) {
    const check = cycle.checks.find((one) => one.check === id && one.verdict === 'differs' && one.accepted === null);
    if (!check || check.stated === null || check.found === null) continue;
    const byReads = check.title.endsWith('meter reads');
    const witness = byReads
      ? 'the meter reads give'
      : energy?.from === 'register'
        ? 'your meter and interval data agree on'
        : 'your interval data give';
    return `Billed ${sayKwh(parseKwh(check.stated) ?? ZERO_WH)} kWh ${word}; ${witness} ${sayKwh(parseKwh(check.found) ?? ZERO_WH)}.`;
  }
  return null;
}

function billTitle(cycle: Cycle): string {
  const difference = subtractCents(cycle.billedDueCents, cycle.oursDueCents ?? cycle.billedDueCents);
  return `${possessive(cycle)} bill is ${sayMoney(cents(Math.abs(difference)))} ${difference > 0 ? 'too high' : 'too low'}`;
}

function possessive(cycle: Cycle): string {
  return `${sayMonth(cycle.to)}’s`;
}

/** The latest cycle on an estimated read, and those that cannot be compared. */
export function openCycles({ assembled }: NeedsInput): Need[] {
  const open = assembled.map((one) => one.cycle).filter((cycle) => cycle.state === 'open');
  const needs: Need[] = [];
  const provisional = open.filter((cycle) => cycle.provisional).at(-1);
  if (provisional) {
    needs.push({
      key: `provisional:${provisional.to}`,
      tone: 'note',
      title: `${possessive(provisional)} read is estimated`,
      detail: 'Its figures are provisional until a statement with an actual read. Read the meter and keep a photo.',
      link: `cycles/${provisional.to}`,
    });
  }
  const unsettled = open.filter((cycle) => cycle.whyNotSettled !== null);
  const last = unsettled.at(-1);
  if (last?.whyNotSettled) {
    needs.push({
      key: `open:${last.to}`,
      tone: 'note',
      title:
        unsettled.length === 1
          ? `${possessive(last)} bill cannot be compared yet`
          : `${sayCount(unsettled.length, 'bill', 'bills')} cannot be compared yet`,
      detail: last.whyNotSettled,
      link: `cycles/${last.to}`,
    });
  }
  return needs;
}

/** Production that is missing in the last cycle, or monitoring with a gap in it. */
export function productionGaps({ assembled }: NeedsInput): Need[] {
  const last = assembled.at(-1);
  if (!last) return [];
  const { cycle, monitorGapDays } = last;
  const { production } = cycle.energy;
  if (production === null) {
    return [
      {
        key: `production:${cycle.to}`,
        tone: 'note',
        title: `No production for ${sayDay(cycle.from)} – ${sayDay(cycle.to)}`,
        detail:
          'Upload the production file or enter the production meter’s reads; until then the bill avoided is an estimate or missing.',
        link: 'log',
      },
    ];
  }
  if (monitorGapDays === 0 && production.coverage === 1) return [];
  return [
    {
      key: `production-gap:${cycle.to}`,
      tone: 'note',
      title: `Production data lack ${monitorGapDays > 0 ? sayCount(monitorGapDays, 'day', 'days') : 'some readings'} of the last cycle`,
      detail:
        'Look whether the inverter was off or only its reporting, and upload the missing days if they can be had.',
      link: `cycles/${cycle.to}`,
    },
  ];
}
