import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { PrintedLine, Statement } from '#shared/facts/papers.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import type { Check } from '#shared/reconcile/check.ts';
import { BUILT_TODAY, buildHousehold } from '#tests/support/build-household.ts';

/** The built household with one of its statements changed. */
export function changed(
  index: number,
  change: (statement: Statement) => Statement,
  facts = buildHousehold(),
): HouseholdFacts {
  return { ...facts, statements: facts.statements.map((one, at) => (at === index ? change(one) : one)) };
}

/** A cycle's check by its key; throws where there is none. */
export function check(facts: HouseholdFacts, index: number, key: string): Check {
  const checks = checksOf(facts, index);
  const found = checks.find((one) => one.key === key);
  if (!found) throw new Error(`no check ${key} among ${checks.map((one) => one.key).join(' ')}`);
  return found;
}

export function checksOf(facts: HouseholdFacts, index: number): Check[] {
  return computeLedger(facts, { today: BUILT_TODAY }).cycles[index]?.checks ?? [];
}

/** The keys of a cycle's checks that differ. */
export function differing(facts: HouseholdFacts, index: number): string[] {
  return checksOf(facts, index)
    .filter((one) => one.verdict === 'differs')
    .map((one) => one.key);
}

/** A statement with the printed lines of one component changed. */
export function withLine(
  component: string,
  change: (line: PrintedLine) => PrintedLine,
): (statement: Statement) => Statement {
  return (statement) => ({
    ...statement,
    lines: statement.lines.map((line) => (line.component === component ? change(line) : line)),
  });
}
