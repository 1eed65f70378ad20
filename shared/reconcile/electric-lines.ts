import type { IncentiveFacts } from '../facts/finance.ts';
import type { PrintedLine } from '../facts/papers.ts';

/** Words by which a line is known as no charge for electricity (ledger.md §5.1): it is left out of the bill as it was. */
const NOT_CURRENT =
  /\b(late (fee|charge|payment)|penalt(y|ies)|deposit|instal+ments?|payment plan|returned (check|payment))\b/i;

/**
 * Whether a printed line is a current charge or credit for electricity: in the amount due, and no previous balance, payment, other service,
 * late fee, deposit or instalment.
 */
export function isElectric(line: Pick<PrintedLine, 'component' | 'kind' | 'label' | 'inDue'>): boolean {
  if (!line.inDue || line.kind === 'previousBalance' || line.kind === 'payment' || line.kind === 'otherService')
    return false;
  return line.component !== null || !NOT_CURRENT.test(line.label);
}

/** Whether a line is the production incentive paid inside the bill, which counts in its own book and is added back here. */
export function isIncentiveInBill(line: PrintedLine, incentive: IncentiveFacts | null): boolean {
  return line.kind === 'incentive' && line.inDue && incentive?.paidAs === 'billCredit';
}

/**
 * Whether a line is carried into our side as billed: what no meter and no rate plan can say (other services, the account's balance and
 * payments, late fees and deposits whatever their kind, and adjustments the plan does not know).
 */
export function isCarried(line: PrintedLine, component: string | null): boolean {
  if (component !== null) return false;
  if (line.inDue && !isElectric(line)) return true;
  return ['otherService', 'previousBalance', 'payment', 'adjustment'].includes(line.kind);
}
