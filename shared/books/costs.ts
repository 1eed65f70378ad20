import { type CostFacts, type CostKind, INCOME_KINDS } from '../facts/house.ts';
import { negateCents } from '../units/cents.ts';
import type { Day } from '../units/day.ts';
import type { Source } from '../working.ts';
import type { UnplacedEntry } from './book.ts';
import { stated, usdInput } from './inputs.ts';

/** What keeping the roof up costs, year after year; everything else is in the costs book. */
const UPKEEP_KINDS: readonly CostKind[] = ['upkeep', 'repair', 'insurance', 'propertyTax'];

/** Cash entries of costs and incomes through a day: incomes positive, costs negative. `documents` gives a paper its name. */
export function costEntries(
  costs: readonly CostFacts[],
  through: Day,
  documents: readonly { id: string; fileName: string }[] = [],
): UnplacedEntry[] {
  return costs
    .filter((cost) => cost.on <= through)
    .map((cost) => {
      const income = INCOME_KINDS.includes(cost.kind);
      return {
        id: `cost-${cost.id}`,
        date: cost.on,
        book: UPKEEP_KINDS.includes(cost.kind) ? 'upkeep' : 'costs',
        kind: cost.kind,
        label: cost.label,
        amountCents: income ? cost.amountCents : negateCents(cost.amountCents),
        basis: 'cash',
        estimated: false,
        working: {
          words: income ? 'Received, as entered' : 'Paid, as entered',
          formula: income ? 'amount' : '-amount',
          inputs: [usdInput('amount', cost.label, cost.amountCents, sourceOf(cost, documents))],
          unit: 'USD',
          basis: 'entered',
        },
      };
    });
}

function sourceOf(cost: CostFacts, documents: readonly { id: string; fileName: string }[]): Source {
  const paper = documents.find((document) => document.id === cost.documentId);
  if (!paper) return stated('Costs and incomes as entered');
  return { kind: 'document', documentId: paper.id, fileName: paper.fileName, place: 'the whole file' };
}
