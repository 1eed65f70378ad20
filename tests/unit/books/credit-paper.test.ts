import { describe, expect, it } from 'vitest';
import { CREDIT_PAPER_KINDS, creditPaperKind, namedAs } from '#shared/books/credit-paper.ts';

describe('what a paper of the credit is', () => {
  it.each([
    ['signed_contract.pdf', 'contract'],
    ['Final-Invoice 2024.pdf', 'invoice'],
    ['receipt.png', 'payment'],
    ['PTO letter.pdf', 'permission'],
    ['Form 5695 (2024).pdf', 'return'],
    ['scan0001.pdf', 'other'],
    ['contractor photo.jpg', 'other'],
  ])('%s is read by its name: %s', (fileName, kind) => {
    expect(creditPaperKind(fileName)).toBe(kind);
  });

  it('is what its owner says, in front of the name, and can be said anew', () => {
    const named = namedAs('scan0001.pdf', 'inspection');
    expect(named).toBe('final inspection, scan0001.pdf');
    expect(creditPaperKind(named)).toBe('inspection');
    expect(namedAs(named, 'rebate')).toBe('rebate letter, scan0001.pdf');
    expect(namedAs(named, 'other')).toBe('scan0001.pdf');
    expect(namedAs('contract.pdf', 'other')).toBe('paper, contract.pdf');
  });

  it('said of any name for any kind, is that kind', () => {
    for (const { kind } of CREDIT_PAPER_KINDS) {
      for (const name of ['a.pdf', 'contract.pdf', 'return, x.pdf', 'invoice, contract.pdf']) {
        expect(creditPaperKind(namedAs(name, kind))).toBe(kind);
      }
    }
  });
});
