import type { Credit, PlanBank } from '../../settlement/plan.ts';
import type { SettledAmounts } from '../../settlement/settle.ts';
import type { CycleUsage, SettledBank } from '../../settlement/settlement.ts';
import { ZERO_WH } from '../../units/energy.ts';
import { Exact, kwhOf } from '../../units/rate.ts';
import { withClose } from './bank-move.ts';
import { type Edit, edit, hypothesis, type Place } from './edit.ts';
import { eachAndAll, sayList, withBank, withCharges, withCredits } from './plan-edit.ts';

/** Exported kWh are netted against import and credited again, or one credit is given twice (net-metering.md §4, "double or half credit"). */
export const creditedTwice = hypothesis('creditedTwice', (place: Place) => [
  ...creditedAfterNetting(place),
  ...nettedBeforeCredit(place),
  ...bankedAfterNetting(place),
  ...givenTwice(place),
  ...bankedTwice(place),
]);

/** The plan nets, and credits only what is left: all that was exported is credited. */
function creditedAfterNetting({ cycle: { plan }, mayDiffer }: Place): Edit[] {
  const left = plan.credits.filter(
    (credit) => credit.basis === 'export' && (credit.netting ?? plan.netting) !== 'none' && mayDiffer(credit.id),
  );
  return eachAndAll(left).map((credits) => {
    const made = withCredits(plan, idsOf(credits), (credit) => ({ ...credit, netting: 'none' }));
    return edit(`credit ${idsOf(credits).join()}`, { plan: made }, sayTwice(credits), {
      credits: idsOf(credits).join(', '),
    });
  });
}

/** The plan credits all that is exported and nets nothing: import is netted as well. */
function nettedBeforeCredit({ cycle: { plan }, mayDiffer }: Place): Edit[] {
  const credits = plan.credits.filter(
    (credit) => credit.basis === 'export' && (credit.netting ?? plan.netting) === 'none',
  );
  if (credits.length === 0) return [];
  const gross = plan.charges.filter(
    (charge) => charge.basis === 'import' && (charge.netting ?? plan.netting) === 'none' && mayDiffer(charge.id),
  );
  return eachAndAll(gross).map((charges) => {
    const ids = charges.map((charge) => charge.id);
    const made = withCharges(plan, ids, (charge) => ({ ...charge, netting: 'cycle' }));
    return edit(`charge ${ids.join()}`, { plan: made }, sayTwice(credits), { charges: ids.join(', ') });
  });
}

/** A kWh bank earns all that was exported, also what was netted in the cycle. */
function bankedAfterNetting(place: Place): Edit[] {
  const { usage } = place.cycle;
  return kwhBanks(place).map((bank) => {
    const again = (pocket: SettledBank) => kwhOf(exportedIn(usage, pocket)).times(bank.ratio).minus(pocket.move.earned);
    return edit(
      `bank ${bank.id}`,
      { after: (settled) => withClose(settled, bank, again, true) },
      `Exported kWh were netted against import and added to ${bank.label} again.`,
      { bank: bank.id },
    );
  });
}

function kwhBanks({ cycle: { plan }, mayDiffer }: Place): PlanBank[] {
  return plan.banks.filter((bank) => bank.unit === 'kWh' && mayDiffer(bank.id));
}

function exportedIn(usage: CycleUsage, { period }: SettledBank) {
  return period === null ? usage.exportWh : (usage.byPeriod?.[period]?.exportWh ?? ZERO_WH);
}

/** One credit, two lines of it. */
function givenTwice({ cycle: { plan }, mayDiffer }: Place): Edit[] {
  return plan.credits
    .filter((credit) => mayDiffer(credit.id))
    .map((credit) =>
      edit(
        `twice ${credit.id}`,
        {
          plan: { ...plan, credits: [...plan.credits, { ...credit, id: `${credit.id}${AGAIN}` }] },
          after: (settled) => nameAgain(settled),
        },
        `${credit.label} was given twice.`,
        { credits: credit.id },
      ),
    );
}

/** Marks the second of a pair inside one trial; a plan's own ids are never this long. */
const AGAIN = 'GivenAgain';

function nameAgain(settled: SettledAmounts): SettledAmounts {
  const plain = <Line extends { component: string }>(line: Line): Line => ({
    ...line,
    component: line.component.endsWith(AGAIN) ? line.component.slice(0, -AGAIN.length) : line.component,
  });
  const { lines, payouts } = settled.settlement;
  return {
    ...settled,
    settlement: { ...settled.settlement, lines: lines.map(plain), payouts: payouts.map(plain) },
  };
}

function bankedTwice(place: Place): Edit[] {
  const { plan } = place.cycle;
  return kwhBanks(place).map((bank) =>
    edit(
      `bank twice ${bank.id}`,
      { plan: withBank(plan, bank.id, (one) => ({ ...one, ratio: new Exact(one.ratio).times(2).toString() })) },
      `What this cycle left over was added to ${bank.label} twice.`,
      { bank: bank.id },
    ),
  );
}

function idsOf(credits: readonly Credit[]): string[] {
  return credits.map((credit) => credit.id);
}

function sayTwice(credits: readonly Credit[]): string {
  return `Exported kWh were netted against import and credited again as ${sayList(credits.map((credit) => credit.label))}.`;
}
