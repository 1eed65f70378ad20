import { input, ownFigure } from '../metering/source.ts';
import { compare, minus, plus, qtyOfText, qtyText } from '../settlement/quantity.ts';
import { type Cents, cents, dollarsText, parseDollars, sumCents, ZERO_CENTS } from '../units/cents.ts';
import type { Working } from '../working.ts';
import type { Cycle } from './cycle.ts';
import type { OwedList, OwedRow } from './owed-list.ts';

/**
 * What the utility owes or is owed, cycle by cycle: the amount due as billed less as it should have been, and what the banks lack at the close.
 * A cycle whose bill agrees, that is not settled or still provisional gives no row. Each cycle opens with what the statement before it closed
 * with, so that nothing is listed twice.
 */
export function owedOf(cycles: readonly Cycle[]): OwedList {
  const rows: OwedRow[] = [];
  let running: Cents = ZERO_CENTS;
  let kwh = qtyOfText('0');
  for (const cycle of cycles) {
    if (cycle.state !== 'differs' && cycle.state !== 'accepted') continue;
    const row = rowOf(cycle);
    if (row === null) continue;
    if (!row.accepted) {
      running = cents(running + row.amountCents);
      if (row.bankKwh !== null) kwh = plus(kwh, qtyOfText(row.bankKwh));
    }
    rows.push({ ...row, runningCents: running });
  }
  const counted = rows.filter((row) => !row.accepted).map((row) => row.amountCents);
  return { rows, totalCents: sumCents(counted), totalKwh: qtyText(kwh), working: totalWorking(counted) };
}

function rowOf(cycle: Cycle): Omit<OwedRow, 'runningCents'> | null {
  if (cycle.settlement === null || cycle.oursDueCents === null) return null;
  // Within its tolerance a total agrees, and rounding is owed to nobody. On a budget plan the charges and the amount due are two totals.
  const totals = cycle.checks.filter((check) => check.check === 'amountDue' && check.verdict === 'differs');
  const dueCents = sumCents(totals.map((check) => parseDollars(check.difference ?? '0') ?? ZERO_CENTS));
  const bank = bankShort(cycle);
  if (dueCents === 0 && bank.cents === 0 && bank.kwh === null) return null;
  const amountCents = cents(dueCents + bank.cents);
  return {
    from: cycle.from,
    to: cycle.to,
    causes: causesOf(cycle),
    dueCents,
    bankCents: bank.cents,
    bankKwh: bank.kwh,
    amountCents,
    accepted: cycle.state === 'accepted',
    working: rowWorking(cycle, dueCents, bank.cents),
  };
}

/** Ours at the close less printed, over the banks that are one figure on both sides. */
function bankShort(cycle: Cycle): { cents: Cents; kwh: string | null } {
  let short = 0;
  let kwh = qtyOfText('0');
  const ours = cycle.settlement?.banks.filter((bank) => bank.period === null) ?? [];
  for (const bank of ours) {
    const sameUnit = cycle.statement.banks.filter((printed) => printed.unit === bank.unit);
    const printed =
      sameUnit.find((one) => one.bank === bank.bank) ??
      (sameUnit.length === 1 && ours.filter((one) => one.unit === bank.unit).length === 1 ? sameUnit[0] : undefined);
    if (printed?.close == null) continue;
    if (bank.unit === 'USD') short += (parseDollars(bank.move.close) ?? 0) - (parseDollars(printed.close) ?? 0);
    else kwh = plus(kwh, minus(qtyOfText(bank.move.close), qtyOfText(printed.close)));
  }
  return { cents: cents(short), kwh: compare(kwh, qtyOfText('0')) === 0 ? null : qtyText(kwh) };
}

function causesOf(cycle: Cycle): string[] {
  if (cycle.causes.length > 0) return cycle.causes.map((cause) => cause.words);
  const said = cycle.checks.flatMap((check) =>
    check.verdict === 'differs' && check.cause !== null ? [check.cause] : [],
  );
  const causes = [...new Set(said)];
  return causes.length > 0 ? causes : ['No single mistake that was tried gives the billed cents.'];
}

function rowWorking(cycle: Cycle, dueCents: Cents, bankCents: Cents): Working {
  const name = `the cycle ending ${cycle.to}`;
  return {
    words: 'Billed too much, and what the dollar bank lacks at the close',
    formula: 'due + bank',
    inputs: [
      input('due', 'Amount due, billed less metered', dollarsText(dueCents), 'USD', ownFigure(name)),
      input('bank', 'Dollar bank at the close, ours less printed', dollarsText(bankCents), 'USD', ownFigure(name)),
    ],
    unit: 'USD',
    basis: 'computed',
  };
}

function totalWorking(amounts: readonly Cents[]): Working {
  return {
    words: 'The rows added, but those accepted with a note',
    formula: 'sum(rows)',
    inputs: [input('rows', 'Owed, by cycle', amounts.map(dollarsText), 'USD', ownFigure('the list of differences'))],
    unit: 'USD',
    basis: 'computed',
  };
}
