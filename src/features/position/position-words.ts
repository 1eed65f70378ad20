import type { PositionView } from '#shared/api/position.ts';
import type { Position } from '#shared/position/position.ts';
import { dollars } from '#src/lib/format.ts';

export type Part = { text: string; tone: 'ahead' | 'behind' | 'plain' };

/** The large sentence: where the house stands, and how fast that changes. */
export function standing(position: Position): Part[] {
  const settled = position.settledToday.amountCents;
  const behind = settled < 0;
  const size = dollars(Math.abs(settled) as typeof settled);
  const first: Part =
    settled === 0
      ? { text: 'Even to the dollar', tone: 'ahead' }
      : { text: `${size} ${behind ? 'from even' : 'past even'}`, tone: behind ? 'behind' : 'ahead' };
  const pace = position.pace?.amountCents ?? null;
  if (pace === null || Math.abs(pace) < 50) return [first, { text: '.', tone: 'plain' }];
  const speed: Part = { text: dollars(Math.abs(pace) as typeof pace), tone: pace > 0 ? 'ahead' : 'behind' };
  const verb = behind ? (pace > 0 ? ', closing ' : ', falling back ') : pace > 0 ? ', gaining ' : ', losing ';
  return [first, { text: verb, tone: 'plain' }, speed, { text: ' a month.', tone: 'plain' }];
}

/** "25 cycles balanced, 1 differs" */
export function countWords(counts: PositionView['counts']): string {
  const parts: string[] = [];
  const balanced = counts.balanced;
  if (balanced > 0) parts.push(`${balanced} ${balanced === 1 ? 'cycle' : 'cycles'} balanced`);
  if (counts.accepted > 0) parts.push(`${counts.accepted} accepted`);
  if (counts.differs > 0) parts.push(`${counts.differs} ${counts.differs === 1 ? 'differs' : 'differ'}`);
  if (counts.open > 0) parts.push(`${counts.open} open`);
  return parts.join(', ');
}
