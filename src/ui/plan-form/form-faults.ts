import { parseDay } from '#shared/units/day.ts';
import { plainDecimal } from '#src/lib/typed-values.ts';
import type { FormFault } from './edit.ts';
import type { BankForm, ChargeForm, CreditForm, PlanForm, ShareForm, TrueUpForm } from './plan-form.ts';
import { limitsOf, pricedItems } from './price-cells.ts';

const isNumber = (text: string) => plainDecimal(text) !== null;
const isWhole = (text: string) => /^[1-9]\d{0,3}$/.test(text.trim());
const isDay = (text: string) => parseDay(text) !== null;

/** What is missing or does not read in a plan's form whose plan holds from a day. What the plan as a whole may not say, the server says. */
export function planFormFaults(form: PlanForm, holdsFrom: string): FormFault[] {
  const faults: FormFault[] = [];
  const say = (path: string, message: string) => faults.push({ path, message });
  form.seasons.forEach((season, at) => {
    if (season.name.trim() === '') say(`seasons.${at}.name`, 'Name the season as the sheet does.');
  });
  form.periods.forEach((period, at) => {
    if (period.label.trim() === '') say(`periods.${at}.label`, 'Name the period as the sheet does.');
    if (!period.rest && period.hours.length === 0) say(`periods.${at}.hours`, 'Add the hours of this period.');
    period.hours.forEach((hours, row) => {
      if (hours.from === hours.to) say(`periods.${at}.hours.${row}`, 'These hours begin and end at the same time.');
    });
  });
  const dates = form.holidays.split(/[\s,;]+/).filter((text) => text !== '');
  const unread = dates.find((text) => !isDay(text));
  if (unread !== undefined) say('holidays', `“${unread}” is no date. Write each as 2026-07-04.`);
  for (const [at, charge] of form.charges.entries()) chargeFaults(charge, `charges.${at}`, say);
  for (const [at, credit] of form.credits.entries()) creditFaults(credit, `credits.${at}`, say);
  for (const [at, bank] of form.banks.entries()) bankFaults(bank, `banks.${at}`, say);
  priceFaults(form, holdsFrom, say);
  return faults;
}

type Say = (path: string, message: string) => void;

function chargeFaults(charge: ChargeForm, at: string, say: Say): void {
  if (charge.label.trim() === '') say(`${at}.label`, 'Name it as the statement does.');
  if ((charge.basis === 'percent' || charge.basis === 'floor') && charge.on.length === 0)
    say(`${at}.on`, charge.basis === 'percent' ? 'Say what the tax is on.' : 'Say which charges it tops up.');
  if (charge.basis === 'kW' && charge.kWOf === '') say(`${at}.kWOf`, 'Say which kW are counted.');
  charge.tiers.forEach((row, index) => {
    const limits = limitsOf(row.limits);
    if (limits.length === 0 || limits.some((text) => !isNumber(text)))
      say(`${at}.tiers.${index}.limits`, 'Write where each tier but the last ends, such as 500 or 500; 1000.');
    if (index > 0 && !isDay(row.from)) say(`${at}.tiers.${index}.from`, 'Choose the day these tiers began.');
  });
}

function creditFaults(credit: CreditForm, at: string, say: Say): void {
  if (credit.label.trim() === '') say(`${at}.label`, 'Name it as the statement does.');
  if (credit.priced === 'share') shareFaults(credit, at, say);
  if ((credit.termFrom === '') !== (credit.termTo === '') || (credit.termFrom !== '' && !isDay(credit.termFrom)))
    say(`${at}.termFrom`, 'Choose the first and the last day, or neither.');
  if (credit.capAmount.trim() !== '' && !isNumber(credit.capAmount))
    say(`${at}.capAmount`, 'Write an amount in dollars, or leave it empty.');
}

function shareFaults(part: ShareForm, at: string, say: Say): void {
  if (part.shareOf.length === 0) say(`${at}.shareOf`, 'Say of which charges it is a share.');
  if (!isNumber(part.sharePercent.replace('%', ''))) say(`${at}.sharePercent`, 'Write a percent such as 75.');
}

function bankFaults(bank: BankForm, at: string, say: Say): void {
  if (bank.label.trim() === '') say(`${at}.label`, 'Name it as the statement does.');
  if (!isNumber(bank.ratio)) say(`${at}.ratio`, 'Write a number such as 1.');
  if (bank.lotCycles.trim() !== '' && !isWhole(bank.lotCycles))
    say(`${at}.lotCycles`, 'Write a number of bills such as 12, or leave it empty.');
  for (const [index, trueUp] of bank.trueUps.entries()) trueUpFaults(trueUp, `${at}.trueUps.${index}`, say);
}

function trueUpFaults(trueUp: TrueUpForm, at: string, say: Say): void {
  if (trueUp.at === 'months' && trueUp.months.length === 0) say(`${at}.months`, 'Choose the month.');
  if (trueUp.keep === 'amount' && !isNumber(trueUp.keepAmount)) say(`${at}.keepAmount`, 'Write what may be kept.');
  if (trueUp.keep === 'average' && !isWhole(trueUp.keepCycles))
    say(`${at}.keepCycles`, 'Write a number of months such as 4.');
  if (!isNumber(trueUp.atLeast)) say(`${at}.atLeast`, 'Write an amount, or 0.');
  if (!isNumber(trueUp.fee)) say(`${at}.fee`, 'Write an amount, or 0.');
  if (trueUp.action === 'pay' && trueUp.priced === 'share') shareFaults(trueUp, at, say);
}

const EXAMPLES: Record<string, string> = {
  '%': 'Write the percent, such as 3.1.',
  '$ per kWh': 'Write the price of a kWh, such as 0.1684.',
  '$ per kW': 'Write the price of a kW, such as 2.10.',
};

function priceFaults(form: PlanForm, holdsFrom: string, say: Say): void {
  form.prices.forEach((row, at) => {
    const before = form.prices[at - 1];
    if (!isDay(row.from)) say(`prices.${at}.from`, 'Choose the day these prices began.');
    else if (before && before.from >= row.from) say(`prices.${at}.from`, 'Later prices begin on a later day.');
  });
  for (const item of pricedItems(form)) {
    for (const { key } of item.cells) {
      const example = EXAMPLES[item.unit] ?? 'Write the amount, such as 14.50.';
      form.prices.forEach((row, at) => {
        const text = (row.cells[key] ?? '').replace('%', '');
        if (text.trim() !== '' && !isNumber(text)) say(`prices.${at}.cells.${key}`, example);
      });
      const first = form.prices.findIndex((row) => (row.cells[key] ?? '').trim() !== '');
      const began = form.prices[first]?.from;
      // A price may begin in a later row than another, as long as it holds when the plan does.
      if (first < 0 || (first > 0 && began !== undefined && began > holdsFrom)) say(`prices.0.cells.${key}`, example);
    }
  }
}
