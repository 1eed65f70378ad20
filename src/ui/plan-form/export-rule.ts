import { freeId, newBank, newCredit, partIds } from './new-parts.ts';
import type { ChargeForm, PlanForm } from './plan-form.ts';

/** What happens to energy sent out, as one question asks it. `other`: the plan says something no single answer does. */
export type ExportRule = 'priced' | 'pricedAfterNetting' | 'carried' | 'soldAll' | 'nothing' | 'other';

export const EXPORT_RULES: { value: Exclude<ExportRule, 'other'>; label: string; hint: string }[] = [
  {
    value: 'priced',
    label: 'Every kWh sent out earns a price in dollars',
    hint: 'Net billing: two registers, two prices.',
  },
  {
    value: 'pricedAfterNetting',
    label: 'It is taken off what you buy; what is left at the end of the cycle earns a price',
    hint: 'Net metering with a monthly price for the surplus.',
  },
  {
    value: 'carried',
    label: 'It is taken off what you buy; kWh left over are carried to later months',
    hint: 'Net metering with a kWh bank.',
  },
  {
    value: 'soldAll',
    label: 'Everything the roof makes is sold, and everything the house uses is bought',
    hint: 'Buy all, sell all.',
  },
  { value: 'nothing', label: 'Nothing is credited', hint: 'What you send out is given away.' },
];

/** Money kept for an incentive alone, until it is paid: it has nothing to do with what is sent out. */
function incentiveBanks(form: PlanForm): PlanForm['banks'] {
  return form.banks.filter(
    ({ id, unit, offsets }) =>
      unit === 'USD' &&
      offsets.length === 0 &&
      form.credits.some((credit) => credit.to === id) &&
      form.credits.every((credit) => credit.to !== id || credit.kind === 'incentive'),
  );
}

export function exportRuleOf(form: PlanForm): ExportRule {
  const exported = form.credits.filter(({ kind }) => kind === 'export');
  const apart = incentiveBanks(form);
  const banks = form.banks.filter((bank) => !apart.includes(bank));
  const kwhBanks = banks.filter(({ unit }) => unit === 'kWh');
  if (exported.length === 0) {
    if (banks.length === 0) return 'nothing';
    return kwhBanks.length === banks.length ? 'carried' : 'other';
  }
  if (kwhBanks.length > 0) return 'other';
  if (exported.some(({ basis }) => basis === 'production')) return 'soldAll';
  return form.netting === 'cycle' ? 'pricedAfterNetting' : 'priced';
}

/** The form with another answer; names, prices and everything that still applies stay. */
export function withExportRule(form: PlanForm, rule: Exclude<ExportRule, 'other'>): PlanForm {
  const whole = rule === 'soldAll';
  const charges = form.charges.map(
    (charge): ChargeForm => ({
      ...charge,
      basis:
        whole && charge.kind === 'import' && charge.basis === 'import'
          ? 'load'
          : !whole && charge.basis === 'load'
            ? 'import'
            : charge.basis,
    }),
  );
  const incentives = form.credits.filter(({ kind }) => kind === 'incentive');
  const energy = charges.filter(({ kind, netting }) => kind === 'import' && netting === '').map(({ id }) => id);
  const byPeriod = charges.some((charge) => charge.byPeriod);
  const base: PlanForm = { ...form, charges, load: whole ? 'computed' : 'none' };
  const apart = incentiveBanks(form);
  const banks = form.banks.filter((bank) => !apart.includes(bank));
  const taken = [...partIds(base).filter((id) => !banks.some((bank) => bank.id === id))];
  const bankId = banks[0]?.id ?? freeId(taken, 'creditBank');
  const label = banks[0]?.label ?? 'Credit bank';
  const money = banks.find(({ unit }) => unit === 'USD');
  const apartIds = apart.map(({ id }) => id);
  const paidFrom = (ids: string[]) =>
    incentives.map((credit) =>
      credit.to === 'bill' || credit.to === 'separate' || [...ids, ...apartIds].includes(credit.to)
        ? credit
        : { ...credit, to: 'separate' },
    );
  switch (rule) {
    case 'nothing':
      return { ...base, netting: 'none', credits: paidFrom([]), banks: apart };
    case 'carried': {
      const bank =
        banks.find(({ unit }) => unit === 'kWh') ??
        newBank(bankId, label, 'kWh', { offsets: energy, sameCycle: false, byPeriod });
      return { ...base, netting: byPeriod ? 'period' : 'cycle', credits: paidFrom([]), banks: [bank, ...apart] };
    }
    default: {
      const offsets = whole
        ? charges.filter(({ basis }) => basis !== 'percent' && basis !== 'floor').map(({ id }) => id)
        : energy;
      const bank = money ?? newBank(bankId, label, 'USD', { offsets });
      const known = form.credits.filter(({ kind }) => kind === 'export');
      const exported = (
        known.length > 0
          ? known
          : [newCredit(freeId(partIds({ ...base, credits: incentives }), 'exportCredit'), 'Export credit', bank.id)]
      ).map((credit) => ({
        ...credit,
        basis: whole ? ('production' as const) : ('export' as const),
        to: credit.to === 'bill' || credit.to === 'separate' ? credit.to : bank.id,
      }));
      const netting =
        rule === 'pricedAfterNetting' ? 'cycle' : rule === 'priced' && form.netting !== 'cycle' ? form.netting : 'none';
      return { ...base, netting, credits: [...exported, ...paidFrom([bank.id])], banks: [bank, ...apart] };
    }
  }
}
