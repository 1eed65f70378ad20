import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { PrintedLine } from '#shared/facts/papers.ts';
import { cents } from '#shared/units/cents.ts';

export type BudgetMonth = {
  /** Null: this bill is on no budget plan. */
  instalment: number | null;
  settled?: number;
  /** Services beside electricity, in cents, by label; they are part of the amount due. */
  services?: Record<string, number>;
};

/** A line that is no charge for electricity. */
export function serviceLine(label: string, amount: number, kind: PrintedLine['kind'] = 'otherService'): PrintedLine {
  return {
    component: null,
    kind,
    label,
    quantity: null,
    unit: null,
    rate: null,
    amountCents: cents(amount),
    inDue: true,
    row: null,
  };
}

/**
 * The household's statements as a utility bills them on a budget plan and with other services: each month pays the last bill in full. Whole
 * numbers are added here, apart from the ledger.
 */
export function onBudget(facts: HouseholdFacts, month: (at: number) => BudgetMonth): HouseholdFacts {
  let balance = 0;
  let lastDue = 0;
  const statements = facts.statements.map((statement, at) => {
    const { instalment, settled = 0, services = {} } = month(at);
    let charges = 0;
    for (const line of statement.lines) if (line.inDue) charges += line.amountCents;
    const others = Object.values(services).reduce((sum, amount) => sum + amount, 0);
    // A plan that is left is settled outside these statements, and one begun again begins at nothing.
    balance = instalment === null ? 0 : balance + charges - instalment - settled;
    const due = others + (instalment === null ? charges : instalment + settled);
    const made = {
      ...statement,
      lines: [...statement.lines, ...Object.entries(services).map(([label, amount]) => serviceLine(label, amount))],
      previousBalanceCents: at === 0 ? null : cents(lastDue),
      paymentsCents: at === 0 ? null : cents(-lastDue),
      amountDueCents: cents(due),
      budget:
        instalment === null
          ? null
          : {
              instalmentCents: cents(instalment),
              balanceCents: cents(balance),
              settledCents: settled === 0 ? null : cents(settled),
            },
    };
    lastDue = due;
    return made;
  });
  return { ...facts, statements };
}
