import { describe, expect, it } from 'vitest';
import { centsOf, type Paper, rowsWhere, sampleHours, samplePapers } from './sample-files.ts';

const papers = samplePapers();
const byTo = (to: string): Paper => {
  const found = papers.find((paper) => paper.to === to);
  if (!found) throw new Error(`no statement to ${to}`);
  return found;
};
const kwh = (paper: Paper, channel: string) =>
  rowsWhere(paper, 'read', channel).reduce((sum, row) => sum + Number(row.current) - Number(row.previous), 0);
const balance = (paper: Paper, item: string) => centsOf(rowsWhere(paper, 'balance', item)[0]?.amount ?? '');

/** quantity × rate to the cent, half away from zero, in whole numbers. */
function priced(quantity: string, rate: string): number {
  const scaled = (text: string) => {
    const [whole = '', decimals = ''] = text.split('.');
    return { digits: BigInt(whole + decimals), places: decimals.length };
  };
  const [a, b] = [scaled(quantity), scaled(rate)];
  const unit = 10n ** BigInt(a.places + b.places);
  return Number((2n * 100n * a.digits * b.digits + unit) / (2n * unit));
}

describe('the sample’s statements', () => {
  it('are 27 cycles that follow on, of 28 to 33 days, read on weekdays', () => {
    expect(papers.length).toBe(27);
    papers.forEach((paper, at) => {
      const days = (Date.parse(paper.to) - Date.parse(paper.from)) / 86_400_000;
      expect(days).toBeGreaterThanOrEqual(28);
      expect(days).toBeLessThanOrEqual(33);
      expect(rowsWhere(paper, 'statement')[0]?.days).toBe(String(days));
      expect([0, 6]).not.toContain(new Date(paper.to).getUTCDay());
      if (at > 0) expect(paper.from).toBe(papers[at - 1]?.to);
    });
    expect([papers[0]?.from, papers[25]?.to, papers[26]?.to]).toEqual(['2024-08-14', '2026-10-14', '2026-11-13']);
  });

  it('add up: every priced line is its quantity × its rate, and the amount due is the lines that are in it', () => {
    let pricedLines = 0;
    for (const paper of papers) {
      const lines = rowsWhere(paper, 'line');
      for (const line of lines) {
        if (line.quantity === '' || line.quantity === undefined) continue;
        expect([paper.to, line.label, Math.abs(centsOf(line.amount ?? ''))]).toEqual([
          paper.to,
          line.label,
          priced(line.quantity, line.rate ?? ''),
        ]);
        pricedLines += 1;
      }
      const due = lines
        .filter((line) => line.in_due === 'yes')
        .reduce((sum, line) => sum + centsOf(line.amount ?? ''), 0);
      expect(due + balance(paper, 'previous balance') + balance(paper, 'payments')).toBe(balance(paper, 'amount due'));
    }
    expect(pricedLines).toBeGreaterThan(27 * 5);
  });

  it('carry the credit bank: it opens as it closed, earns the export credit and pays energy only', () => {
    let close = 0;
    for (const paper of papers) {
      const bank = rowsWhere(paper, 'bank')[0];
      const sum = (item: string) =>
        rowsWhere(paper, 'line', item).reduce((all, line) => all + centsOf(line.amount ?? ''), 0);
      expect(centsOf(bank?.previous ?? '')).toBe(close);
      close = centsOf(bank?.current ?? '');
      expect(close).toBe(centsOf(bank?.previous ?? '') - sum('export credit') + sum('credit'));
      expect(close).toBeGreaterThanOrEqual(0);
      expect(-sum('credit')).toBeLessThanOrEqual(sum('import'));
      // Credit stays in the bank only when all energy is paid.
      if (close > 0) expect(-sum('credit')).toBe(sum('import'));
    }
  });

  it('carry the balance, paid in full each month', () => {
    papers.forEach((paper, at) => {
      expect(balance(paper, 'payments')).toBe(-balance(paper, 'previous balance'));
      const before = papers[at - 1];
      if (before) expect(balance(paper, 'previous balance')).toBe(balance(before, 'amount due'));
    });
  });

  it('have registers that follow on, but for the exchange of the net meter on 23 September 2025', () => {
    for (const channel of ['import', 'export', 'production']) {
      const reads = papers.flatMap((paper) => rowsWhere(paper, 'read', channel));
      const breaks = reads.filter((read, at) => at > 0 && read.previous !== reads[at - 1]?.current);
      expect(breaks.map((read) => read.read_from)).toEqual(channel === 'production' ? [] : ['2025-09-23']);
    }
  });

  it('agree with the interval files to ±1 kWh per register difference, but for the estimated read, what made up for it, and the exchange', () => {
    const hours = sampleHours();
    const differing = new Set<string>();
    for (const paper of papers.slice(0, -1)) {
      for (const [channel, field] of [
        ['import', 'importWh'],
        ['export', 'exportWh'],
        ['production', 'productionWh'],
      ] as const) {
        const metered = hours
          .filter(({ day }) => day >= paper.from && day < paper.to)
          .reduce((sum, hour) => sum + hour[field], 0);
        const steps = rowsWhere(paper, 'read', channel).length;
        if (Math.abs(kwh(paper, channel) * 1000 - metered) > steps * 1000) differing.add(`${channel} ${paper.to}`);
      }
    }
    expect([...differing].sort()).toEqual([
      'export 2025-01-14',
      'export 2025-02-13',
      'export 2025-10-14',
      'import 2025-01-14',
      'import 2025-02-13',
    ]);
    const types = papers.flatMap((paper) => rowsWhere(paper, 'read')).filter((read) => read.read_type === 'estimated');
    expect(types.map((read) => [read.service_to, read.item])).toEqual([
      ['2025-01-14', 'import'],
      ['2025-01-14', 'export'],
    ]);
  });

  it('bill what the registers show, but for 44 kWh of export in September 2026', () => {
    const short = papers.flatMap((paper) =>
      (['import', 'export credit'] as const).flatMap((item) => {
        const billed = rowsWhere(paper, 'line', item).reduce((sum, line) => sum + Number(line.quantity), 0);
        const missing = kwh(paper, item === 'import' ? 'import' : 'export') - billed;
        return missing === 0 ? [] : [[paper.to, item, missing]];
      }),
    );
    expect(short).toEqual([['2026-09-14', 'export credit', 44]]);
  });

  it('share the cycle of June 2026 by days between two prices', () => {
    const paper = byTo('2026-06-15');
    for (const item of ['import', 'export credit']) {
      const [before, after] = rowsWhere(paper, 'line', item);
      expect(Number(before?.quantity) * 14).toBe(Number(after?.quantity) * 18);
      expect(before?.rate).not.toBe(after?.rate);
    }
  });
});
