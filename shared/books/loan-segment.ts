import type { LenderBalance, LoanPayment, Refinance } from '../facts/finance.ts';
import { keptAt } from '../settlement/place.ts';
import { cents, ZERO_CENTS } from '../units/cents.ts';
import { addMonths, type Day } from '../units/day.ts';
import type { DecimalText } from '../units/rate-text.ts';
import { type DayRule, dayRule, interestOfDays, interestOfMonth } from './loan-accrual.ts';
import { type Happening, happeningsByMonth, replacesSchedule, type SegmentTerms } from './loan-happenings.ts';
import { type LoanLevel, type LoanRow, type LoanStep, type LoanStepKind, levelFrom, rowOf } from './loan-step.ts';

/** Months past the term that are looked at while a short last payment leaves something owing. */
const MONTHS_PAST_TERM = 600;

/** One loan from its funding to the payment that clears it, or to the new loan that pays it off; the rules are those of `loanBook`. */
export class SegmentRun {
  readonly steps: LoanStep[] = [];
  readonly rows: LoanRow[] = [];
  readonly levels: LoanLevel[] = [];
  private readonly terms: SegmentTerms;
  private readonly days: DayRule;
  private balance: number;
  /** Interest counted and not paid; `current` is the part of it that falls due with the next payment only. */
  private due = 0;
  private current = 0;
  private accruedTo: Day;
  private prepaid = 0;
  private number = 0;
  private dueOn: Day;
  private dueBefore: Day;

  constructor(terms: SegmentTerms) {
    this.terms = terms;
    this.days = dayRule(terms.segment.dayCount);
    this.balance = terms.segment.principalCents;
    this.accruedTo = terms.segment.fundedOn;
    this.dueOn = terms.segment.firstPaymentOn;
    this.dueBefore = this.dueOn;
  }

  run(): this {
    const { segment, refinance } = this.terms;
    const happenings = happeningsByMonth(this.terms);
    const last = Math.max(-1, ...happenings.keys());
    const first = Math.min(0, ...happenings.keys());
    this.dueOn = addMonths(segment.firstPaymentOn, first - 1);
    for (let month = first; month < segment.termMonths + MONTHS_PAST_TERM; month += 1) {
      if (this.balance + this.due <= 0 && month > last) break;
      this.number = Math.max(0, month + 1);
      this.dueBefore = this.dueOn;
      this.dueOn = addMonths(segment.firstPaymentOn, month);
      const isPaidOff = refinance !== null && this.dueOn >= refinance.on;
      const before = this.steps.length;
      if (month === 0 && this.levels.length === 0) this.levelAtStart();
      this.month(happenings.get(month) ?? [], month >= 0 && !isPaidOff);
      if (this.steps.length > before) this.rows.push(rowOf(this.steps.slice(before)));
      if (isPaidOff && month >= last) break;
    }
    if (refinance !== null) this.payOff(refinance);
    return this;
  }

  private month(happenings: readonly Happening[], hasPayment: boolean): void {
    const isRecorded = happenings.some((one) => one.kind === 'record' && replacesSchedule(one.record));
    let pending = hasPayment && this.balance + this.due > 0 && !isRecorded;
    for (const one of happenings) {
      if (pending && this.dueOn <= one.on) {
        pending = false;
        this.payScheduled();
      }
      if (one.kind === 'record') this.payRecorded(one.record, pending);
      else if (one.kind === 'balance') this.takeBalance(one.balance);
      else this.begin(one.on);
    }
    if (pending) this.payScheduled();
    if (!hasPayment) return;
    const { promotion, assumed } = this.terms;
    if (this.number === promotion?.months) this.reamortize('promotionEnd');
    else if (this.number === assumed?.byPayment) this.reamortize('prepayment');
  }

  private rateOf(number: number): DecimalText {
    const { promotion, segment } = this.terms;
    return promotion !== null && number <= promotion.months ? promotion.annualRate : segment.annualRate;
  }

  private modeOf(number: number): 'level' | 'interest' | 'none' {
    const { promotion } = this.terms;
    return promotion !== null && number <= promotion.months ? promotion.payment : 'level';
  }

  /** Counts interest through a day at the rate of the payment it belongs to; a whole month of 30/360 is a twelfth of the year. */
  private accrue(to: Day): void {
    if (to <= this.accruedTo) return;
    const rate = this.rateOf(Math.max(1, this.number));
    const { dayCount } = this.terms.segment;
    const isMonth = dayCount === '30/360' && this.accruedTo === this.dueBefore && to === this.dueOn;
    const interest = isMonth
      ? interestOfMonth(cents(this.balance), rate)
      : interestOfDays(cents(this.balance), rate, dayCount, this.days.between(this.accruedTo, to));
    this.due += interest;
    this.current += interest;
    this.accruedTo = to;
  }

  private payScheduled(): void {
    this.accrue(this.dueOn);
    this.current = 0;
    const toClear = this.balance + this.due;
    const mode = this.modeOf(this.number);
    const level = this.levels.at(-1) ?? null;
    const asked = mode === 'interest' ? this.due : mode === 'none' || level === null ? 0 : level.paymentCents;
    const amount = this.number >= this.terms.segment.termMonths ? toClear : Math.min(asked, toClear);
    const isLevel = mode === 'level' && amount === level?.paymentCents;
    const kind = amount > 0 ? 'payment' : 'skipped';
    this.pay(kind, this.dueOn, amount, 0, isLevel ? level : null, null);
  }

  private payRecorded(record: LoanPayment, isPaymentPending: boolean): void {
    const replaces = replacesSchedule(record);
    const byMonth = this.terms.segment.dayCount === '30/360' && replaces && this.number > 0;
    this.accrue(byMonth ? this.dueOn : record.on);
    if (replaces) this.current = 0;
    const extra = record.extraPrincipalCents;
    this.pay('payment', record.on, record.amountCents - extra, extra, null, record);
    this.prepaid += extra;
    if (!record.reamortize) return;
    if (isPaymentPending) this.setLevel(this.number - 1, 'reamortized', this.balance);
    else this.reamortize('reamortized');
  }

  private pay(
    kind: LoanStepKind,
    on: Day,
    regular: number,
    extra: number,
    level: LoanLevel | null,
    record: LoanPayment | null,
  ): void {
    const interest = Math.max(0, Math.min(this.due, regular));
    const principal = regular - interest + extra;
    const before = { balance: this.balance, due: this.due };
    this.balance -= principal;
    this.due -= interest;
    this.push(kind, on, before, {
      regularCents: cents(regular),
      extraPrincipalCents: cents(extra),
      interestCents: cents(interest),
      principalCents: cents(principal),
      cashCents: cents(-regular - extra),
      level,
      record,
    });
  }

  /** Interest of the days before the first month joins the principal, so that the level payment clears it too. */
  private begin(on: Day): void {
    this.accrue(on);
    this.current = 0;
    this.capitalise(on);
  }

  private capitalise(on: Day): void {
    const added = this.due - this.current;
    if (added <= 0 || this.balance <= 0) return;
    const before = { balance: this.balance, due: this.due };
    this.balance += added;
    this.due -= added;
    this.push('capitalised', on, before, { capitalisedCents: cents(added) });
  }

  private takeBalance({ on, balanceCents }: LenderBalance): void {
    const before = { balance: this.balance, due: this.due };
    // The balance holds since interest was last counted, save where nothing was owed until now.
    if (before.balance <= 0 && on > this.accruedTo) this.accruedTo = on;
    this.balance = balanceCents;
    this.push('lender', on, before, { driftCents: cents(balanceCents - before.balance) });
  }

  private levelAtStart(): void {
    const capitalised = this.steps.reduce((sum, step) => sum + step.capitalisedCents, 0);
    if (this.modeOf(1) === 'level') this.setLevel(0, 'start', this.terms.segment.principalCents + capitalised);
  }

  private reamortize(reason: LoanLevel['reason']): void {
    this.capitalise(keptAt(this.steps, this.steps.length - 1).on);
    this.setLevel(this.number, reason, this.balance);
  }

  /** A new level payment over the months that remain after a payment. A prepayment that is still to come is taken for granted. */
  private setLevel(after: number, reason: LoanLevel['reason'], balance: number): void {
    const { segment, assumed } = this.terms;
    if (after >= segment.termMonths || this.modeOf(after + 1) !== 'level') return;
    const open = assumed !== null && after < assumed.byPayment ? Math.max(0, assumed.amountCents - this.prepaid) : 0;
    this.levels.push(
      levelFrom({
        segment,
        fromNumber: after + 1,
        reason,
        balanceCents: cents(Math.max(0, balance)),
        annualRate: this.rateOf(after + 1),
        months: segment.termMonths - after,
        assumed:
          assumed === null || open === 0 ? null : { amountCents: cents(open), withPayment: assumed.byPayment - after },
      }),
    );
  }

  private payOff(refinance: Refinance): void {
    const { on } = refinance;
    const days = this.days.between(this.accruedTo, on);
    const rate = this.rateOf(Math.max(1, this.accruedTo >= this.dueOn ? this.number + 1 : this.number));
    this.due += interestOfDays(cents(this.balance), rate, this.terms.segment.dayCount, days);
    const before = { balance: this.balance, due: this.due };
    this.balance = 0;
    this.due = 0;
    this.push('paidOff', on, before, {
      interestCents: cents(before.due),
      principalCents: cents(before.balance),
      feeCents: before.balance > 0 ? this.terms.segment.payoffFeeCents : ZERO_CENTS,
      refinance,
    });
    this.rows.push(rowOf(this.steps.slice(-1)));
  }

  private push(kind: LoanStepKind, on: Day, before: { balance: number; due: number }, more: Partial<LoanStep>): void {
    const isThrough = this.accruedTo >= this.dueOn;
    // Field by field: a projection makes thousands of these, and spreading an object is several times slower.
    this.steps.push({
      kind,
      segment: this.terms.segment,
      number: this.number,
      dueOn: this.dueOn,
      on,
      regularCents: more.regularCents ?? ZERO_CENTS,
      extraPrincipalCents: more.extraPrincipalCents ?? ZERO_CENTS,
      interestCents: more.interestCents ?? ZERO_CENTS,
      principalCents: more.principalCents ?? ZERO_CENTS,
      capitalisedCents: more.capitalisedCents ?? ZERO_CENTS,
      driftCents: more.driftCents ?? ZERO_CENTS,
      balanceBeforeCents: cents(before.balance),
      balanceCents: cents(this.balance),
      interestDueCents: cents(before.due),
      unpaidInterestCents: cents(this.due),
      feeCents: more.feeCents ?? ZERO_CENTS,
      accruedTo: this.accruedTo,
      rateAfter: this.rateOf(Math.max(1, isThrough ? this.number + 1 : this.number)),
      level: more.level ?? null,
      record: more.record ?? null,
      refinance: more.refinance ?? null,
      cashCents: more.cashCents ?? ZERO_CENTS,
    });
  }
}

/** The rate a loan is under on its first day. */
export function firstRate({ promotion, segment }: Pick<SegmentTerms, 'promotion' | 'segment'>): DecimalText {
  return promotion?.annualRate ?? segment.annualRate;
}
