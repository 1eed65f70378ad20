import { causesOfCycle, type LedgerCycle } from '../reconcile/causes/cycle-causes.ts';
import type { Check, CheckId } from '../reconcile/check.ts';
import type { AssembledCycle } from './cycles.ts';

/** Checks whose likely cause gives way to one that was found by settling again. */
const EXPLAINED: ReadonlySet<CheckId> = new Set(['amountDue', 'linePrice']);

/**
 * The cycles with the mistakes found by trying (net-metering.md §3): each that differs is settled again under each hypothesis, and every one
 * that gives the billed cents is named. `given` is what the ledger has of a cycle by its place; null where it was not settled.
 */
export function nameCauses(
  cycles: readonly AssembledCycle[],
  given: (at: number) => LedgerCycle | null,
): AssembledCycle[] {
  return cycles.map((one, at) => {
    const { state, checks } = one.cycle;
    if (state !== 'differs' && state !== 'accepted') return one;
    const own = given(at);
    if (own === null) return one;
    const found = causesOfCycle(own, { before: given(at - 1), after: given(at + 1) });
    if (found.length === 0) return one;
    // A check that says the same and knows more of it is heard.
    const fuller = (words: string) => checks.find((check) => check.cause?.startsWith(words))?.cause ?? words;
    const causes = found.map(({ cause, words }) => ({ cause, words: fuller(words) }));
    const words = sentenceOf(causes.map((cause) => cause.words));
    return { ...one, cycle: { ...one.cycle, causes, checks: checks.map((check) => explained(check, words)) } };
  });
}

function explained(check: Check, words: string): Check {
  return check.verdict === 'differs' && EXPLAINED.has(check.check) ? { ...check, cause: words } : check;
}

/** One mistake as it is; several as what they are: each would do. */
function sentenceOf(words: readonly string[]): string {
  const [only] = words;
  if (words.length === 1 && only !== undefined) return only;
  return `Any one of these gives exactly what was billed: ${words.join(' Or: ')}`;
}
