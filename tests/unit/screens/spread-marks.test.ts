import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { spreadMarks } from '#src/ui/chart/spread.ts';

describe('numbered flags above a chart', () => {
  it('leaves flags that stand apart where they are', () => {
    expect(spreadMarks([50, 100, 200], 23, 0, 400)).toEqual([50, 100, 200]);
  });

  it('nudges flags that touch apart around where they wanted to be', () => {
    expect(spreadMarks([100, 102], 20, 0, 400)).toEqual([91, 111]);
  });

  it('keeps every flag inside the chart, in order and the gap apart while they fit', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: 0, max: 400 }), { maxLength: 15 }), (wanted) => {
        const sorted = [...wanted].sort((a, b) => a - b);
        const placed = spreadMarks(sorted, 23, 0, 400);
        expect(placed).toHaveLength(sorted.length);
        for (const [index, x] of placed.entries()) {
          expect(x).toBeGreaterThanOrEqual(-1e-6);
          expect(x).toBeLessThanOrEqual(400 + 1e-6);
          if (index > 0) expect(x - (placed[index - 1] ?? 0)).toBeGreaterThanOrEqual(23 - 1e-6);
        }
      }),
    );
  });
});
