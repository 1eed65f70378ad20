import type { MortgageView } from '#shared/api/money-mortgage.ts';

/** What every part of the insurance sheet is given. */
export type InsuranceProps = { view: MortgageView; householdId: string; canEdit: boolean; today: string };
