/**
 * Moves marks on a line apart until each stands at least `gap` from the next, as little as possible and in their order, inside `[min, max]`.
 * `wanted` must be ascending. When they cannot all fit, the gap shrinks to what does.
 */
export function spreadMarks(wanted: readonly number[], gap: number, min: number, max: number): number[] {
  if (wanted.length === 0) return [];
  const room = wanted.length > 1 ? Math.min(gap, (max - min) / (wanted.length - 1)) : gap;
  // Groups that touch are laid out around the mean of what they wanted, and merge with the neighbours they run into.
  type Group = { sum: number; count: number };
  const groups: Group[] = [];
  const start = (group: Group): number => {
    const width = (group.count - 1) * room;
    const middle = group.sum / group.count;
    return Math.min(Math.max(middle - width / 2, min), max - width);
  };
  for (const x of wanted) {
    let group: Group = { sum: x, count: 1 };
    for (let last = groups.at(-1); last; last = groups.at(-1)) {
      if (start(last) + last.count * room <= start(group)) break;
      groups.pop();
      group = { sum: last.sum + group.sum, count: last.count + group.count };
    }
    groups.push(group);
  }
  return groups.flatMap((group) => {
    const first = start(group);
    return Array.from({ length: group.count }, (_, index) => first + index * room);
  });
}
