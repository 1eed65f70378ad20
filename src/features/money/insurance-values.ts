import type { Appraisal, InsuranceEndRule, MortgageFacts } from '#shared/facts/finance.ts';
import { type Cents, cents, dollarsText, parseDollars } from '#shared/units/cents.ts';
import { type Day, parseDay } from '#shared/units/day.ts';
import { FaultList, type Reading } from '#src/lib/form.ts';
import type { AppraisalBody, BalanceBody, EndBody, PremiumsBody, RecordBody } from './insurance-queries.ts';

const NO_DATE = 'Write a date that exists.';
const NO_AMOUNT = 'Write an amount such as 287,500.';
const NO_COUNT = 'Write a whole number such as 1.';
const SOME_DAY = '1970-01-01' as Day;

export type AppraisalValues = { on: string; valueCents: string; how: Appraisal['how']; documentId: string };

export function readAppraisal(values: AppraisalValues): Reading<AppraisalBody> {
  const list = new FaultList();
  return list.reading({
    on: list.needed(values.on, parseDay, 'on', NO_DATE, SOME_DAY),
    valueCents: list.needed(values.valueCents, aboveZero, 'valueCents', NO_AMOUNT, cents(1)),
    how: values.how,
    documentId: values.documentId === '' ? null : values.documentId,
  });
}

export type BalanceValues = { on: string; balanceCents: string; documentId: string };

export function readBalance(values: BalanceValues): Reading<BalanceBody> {
  const list = new FaultList();
  return list.reading({
    on: list.needed(values.on, parseDay, 'on', NO_DATE, SOME_DAY),
    balanceCents: list.needed(values.balanceCents, zeroOrMore, 'balanceCents', NO_AMOUNT, cents(0)),
    documentId: values.documentId === '' ? null : values.documentId,
  });
}

export type RecordValues = {
  late: 'unknown' | 'none' | 'some';
  thirtyIn12: string;
  sixtyIn24: string;
  units: string;
  occupancy: MortgageFacts['occupancy'];
  otherLien: 'unknown' | 'no' | 'yes';
  requestedOn: string;
};

export function recordValues(facts: MortgageFacts): RecordValues {
  const late = facts.latePayments;
  return {
    late: late === null ? 'unknown' : late.thirtyIn12 + late.sixtyIn24 === 0 ? 'none' : 'some',
    thirtyIn12: late === null ? '' : String(late.thirtyIn12),
    sixtyIn24: late === null ? '' : String(late.sixtyIn24),
    units: String(facts.units),
    occupancy: facts.occupancy,
    otherLien: facts.otherLien === null ? 'unknown' : facts.otherLien ? 'yes' : 'no',
    requestedOn: facts.requestedOn ?? '',
  };
}

export function readRecord(values: RecordValues): Reading<RecordBody> {
  const list = new FaultList();
  const count = (text: string, path: string, most: number) =>
    list.needed(text, (typed) => wholeUpTo(typed, most), path, `${NO_COUNT} At most ${most}.`, 0);
  return list.reading({
    latePayments:
      values.late === 'unknown'
        ? null
        : values.late === 'none'
          ? { thirtyIn12: 0, sixtyIn24: 0 }
          : {
              thirtyIn12: count(values.thirtyIn12, 'thirtyIn12', 12),
              sixtyIn24: count(values.sixtyIn24, 'sixtyIn24', 24),
            },
    units: Number(values.units),
    occupancy: values.occupancy,
    otherLien: values.otherLien === 'unknown' ? null : values.otherLien === 'yes',
    requestedOn: list.optional(values.requestedOn, parseDay, 'requestedOn', NO_DATE),
  });
}

export type EndValues = { endRule: InsuranceEndRule; appreciationOn: string };

export function readEnd(values: EndValues): Reading<EndBody> {
  const list = new FaultList();
  const appreciationOn = list.optional(values.appreciationOn, parseDay, 'appreciationOn', NO_DATE);
  if (values.endRule === 'appreciation' && values.appreciationOn.trim() === '') {
    list.add('appreciationOn', 'Write the day on which the home’s value alone would have been enough.');
  }
  return list.reading({ endRule: values.endRule, appreciationOn });
}

export type PremiumsValues = { premiums: { from: string; premiumMonthlyCents: string }[] };

export function premiumsValues({ premiums }: MortgageFacts): PremiumsValues {
  return {
    premiums: premiums.map((one) => ({
      from: one.from,
      premiumMonthlyCents: dollarsText(one.premiumMonthlyCents),
    })),
  };
}

export function readPremiums(values: PremiumsValues): Reading<PremiumsBody> {
  const list = new FaultList();
  const premiums = values.premiums.map((one, index) => {
    const at = `premiums.${index}`;
    if (values.premiums.findIndex((other) => other.from === one.from) < index && one.from !== '') {
      list.add(`${at}.from`, 'Another premium begins on this day.');
    }
    return {
      from: list.needed(one.from, parseDay, `${at}.from`, NO_DATE, SOME_DAY),
      premiumMonthlyCents: list.needed(
        one.premiumMonthlyCents,
        zeroOrMore,
        `${at}.premiumMonthlyCents`,
        'Write an amount such as 142.50.',
        cents(0),
      ),
    };
  });
  return list.reading({ premiums });
}

function wholeUpTo(text: string, most: number): number | null {
  const whole = /^\d{1,2}$/.test(text.trim()) ? Number(text.trim()) : null;
  return whole !== null && whole <= most ? whole : null;
}

function aboveZero(text: string): Cents | null {
  const amount = parseDollars(text);
  return amount !== null && amount > 0 ? amount : null;
}

function zeroOrMore(text: string): Cents | null {
  const amount = parseDollars(text);
  return amount !== null && amount >= 0 ? amount : null;
}
