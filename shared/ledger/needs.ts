import type { Entry } from '../books/book.ts';
import type { CreditLines } from '../books/credit-lines.ts';
import type { HouseholdFacts } from '../facts/household.ts';
import type { Position } from '../position/position.ts';
import type { Check } from '../reconcile/check.ts';
import { cents, subtractCents } from '../units/cents.ts';
import { addDays, type Day, daysBetween } from '../units/day.ts';
import { parseKwh, ZERO_WH } from '../units/energy.ts';
import type { Cycle } from './cycle.ts';
import type { AssembledCycle } from './cycles.ts';
import type { Need } from './ledger.ts';
import { sayCount, sayDate, sayDay, sayGap, sayKwh, sayMoney, sayMonth } from './say.ts';

/** As many as a person will look at; what is wrong comes first. */
const MOST_NEEDS = 6;
/** A statement is asked for from this many days before its usual day, and called late this many after. */
const STATEMENT_EARLY_DAYS = 3;
const STATEMENT_LATE_DAYS = 14;
/** A programme is given this long to pay before it is asked after. */
const INCENTIVE_PATIENCE_DAYS = 60;
const USUAL_CYCLE_DAYS = 30;
const USUAL_POST_DAYS = 3;

export type NeedsInput = {
  facts: HouseholdFacts;
  assembled: readonly AssembledCycle[];
  entries: readonly Entry[];
  creditLines: readonly CreditLines[];
  position: Pick<Position, 'settledParts'>;
  today: Day;
};

/** What asks for the owner: wrong things first, then what is next; six at most. */
export function needsOf(input: NeedsInput): Need[] {
  const needs = [
    ...differingCycles(input),
    ...owedIncentive(input),
    ...openCycles(input),
    ...nextStatement(input),
    ...productionGaps(input),
    ...carriedCredit(input),
    ...missingFacts(input),
  ];
  return [...needs.filter((need) => need.tone === 'bad'), ...needs.filter((need) => need.tone === 'note')].slice(
    0,
    MOST_NEEDS,
  );
}

function differingCycles({ assembled }: NeedsInput): Need[] {
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

/** "October’s export is credited 13 kWh short", or the name of the check that differs. */
function checkTitle(cycle: Cycle, check: Check | undefined): string {
  if (!check) return `${possessive(cycle)} statement differs`;
  const gap = check.difference === null ? null : parseKwh(check.difference);
  const named = { exportAgainstIntervals: 'export is credited', importAgainstIntervals: 'import is charged' };
  if (gap !== null && (check.check === 'exportAgainstIntervals' || check.check === 'importAgainstIntervals')) {
    return `${possessive(cycle)} ${named[check.check]} ${sayGap(gap)} kWh ${gap < 0 ? 'short' : 'over'}`;
  }
  return `${possessive(cycle)} statement differs: ${check.title.charAt(0).toLowerCase()}${check.title.slice(1)}`;
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

function owedIncentive({ facts, position, entries, today }: NeedsInput): Need[] {
  const owed = position.settledParts.incentiveOwed.amountCents;
  if (facts.incentive === null || owed <= 0) return [];
  // What came settles the oldest first; the day of the oldest entry not yet covered says how long it is owed.
  let covered = entries
    .filter((entry) => entry.book === 'incentive' && entry.basis === 'cash' && entry.date <= today)
    .reduce((sum, entry) => sum + entry.amountCents, 0);
  for (const entry of entries) {
    if (entry.book !== 'incentive' || entry.basis !== 'memo') continue;
    covered -= entry.amountCents;
    if (covered >= 0) continue;
    const waited = daysBetween(entry.date, today);
    if (waited <= INCENTIVE_PATIENCE_DAYS) return [];
    const payer = facts.incentive.payer === '' ? 'the payer' : facts.incentive.payer;
    return [
      {
        key: 'incentive-owed',
        tone: 'bad',
        title: `${sayMoney(owed)} of production incentive is owed`,
        detail: `The oldest of it was earned by ${sayDate(entry.date)}. Record what came, or ask ${payer}.`,
        link: 'money',
      },
    ];
  }
  return [];
}

function openCycles({ assembled }: NeedsInput): Need[] {
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

function nextStatement({ facts, assembled, today }: NeedsInput): Need[] {
  const last = assembled.at(-1);
  if (!last) {
    if (facts.house.switchOn === null) return [];
    return [
      {
        key: 'first-statement',
        tone: 'note',
        title: 'Log the first statement',
        detail: `The record begins at switch-on, ${sayDate(facts.house.switchOn)}.`,
        link: 'log',
      },
    ];
  }
  const recent = assembled.slice(-5);
  const cycleDays = median(recent.map((one) => one.cycle.days)) ?? USUAL_CYCLE_DAYS;
  const posted = recent.flatMap(({ cycle }) =>
    cycle.statement.statementOn ? [daysBetween(cycle.to, cycle.statement.statementOn)] : [],
  );
  const ends = addDays(last.cycle.to, cycleDays);
  const due = addDays(ends, median(posted) ?? USUAL_POST_DAYS);
  if (today < addDays(due, -STATEMENT_EARLY_DAYS)) return [];
  const late = today > addDays(due, STATEMENT_LATE_DAYS);
  const came = recent.flatMap(({ cycle }) => (cycle.statement.statementOn ? [cycle.statement.statementOn] : []));
  const days = came.map((on) => Number(on.slice(8))).sort((a, b) => a - b);
  const [least] = days;
  const most = days.at(-1);
  const usual =
    least !== undefined && most !== undefined && days.length > 1 && most - least <= 10
      ? least === most
        ? `The last ${days.length} came on the ${ordinal(least)}.`
        : `The last ${days.length} came between the ${ordinal(least)} and the ${ordinal(most)}.`
      : `The last one ended on ${sayDay(last.cycle.to)}.`;
  return [
    {
      key: 'next-statement',
      tone: late ? 'bad' : 'note',
      title: late ? `${sayMonth(ends)} statement is late` : `${sayMonth(ends)} statement is due about now`,
      detail: usual,
      link: 'log',
    },
  ];
}

function productionGaps({ assembled }: NeedsInput): Need[] {
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

function carriedCredit({ facts, creditLines, position }: NeedsInput): Need[] {
  const owed = position.settledParts.creditStillToCome.amountCents;
  if (facts.credit === null) return [];
  const carried = creditLines.findLast((lines) => lines.line16Cents !== null && lines.line16Cents > 0);
  const planned = facts.credit.years
    .filter((year) => year.status === 'planned')
    .sort((a, b) => a.taxYear - b.taxYear)[0];
  if (carried?.line16Cents != null && owed > 0) {
    const next = planned && planned.taxYear > carried.taxYear ? planned.taxYear : carried.taxYear + 1;
    return [
      {
        key: 'credit-carried',
        tone: 'note',
        title: `${sayMoney(carried.line16Cents)} of tax credit is still carried forward`,
        detail: `Planned for tax year ${next}. The summary for your preparer is ready.`,
        link: 'credit',
      },
    ];
  }
  if (planned && planned.limitCents === null && owed > 0) {
    return [
      {
        key: 'credit-limit',
        tone: 'note',
        title: `Tax year ${planned.taxYear} needs its limit, line 14`,
        detail: 'Type it from the return’s worksheet; it is never estimated here.',
        link: 'credit',
      },
    ];
  }
  return [];
}

function missingFacts({ facts }: NeedsInput): Need[] {
  const missing: string[] = [];
  if (facts.house.switchOn === null) missing.push('the switch-on date');
  if (facts.plans.length === 0) missing.push('the rate plan');
  if (facts.loan === null && facts.costs.length === 0) missing.push('how the roof was paid for');
  if (facts.credit === null) missing.push('the tax credit');
  if (missing.length === 0) return [];
  const last = missing.pop();
  const list = missing.length === 0 ? last : `${missing.join(', ')} and ${last}`;
  return [
    {
      key: 'set-up',
      tone: 'note',
      title: 'The set-up is not finished',
      detail: `Missing: ${list}. Without them the position is incomplete.`,
      link: 'setup',
    },
  ];
}

function median(values: readonly number[]): number | null {
  if (values.length === 0) return null;
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.floor(sorted.length / 2)] ?? null;
}

function ordinal(count: number): string {
  const tens = count % 100;
  if (tens >= 11 && tens <= 13) return `${count}th`;
  return `${count}${['th', 'st', 'nd', 'rd'][count % 10] ?? 'th'}`;
}
