import type { LoanView } from '#shared/api/money-loan.ts';

/** What every part of the loan's page is given. */
export type LoanProps = { loan: LoanView; householdId: string; canEdit: boolean; today: string };
