/** What a list keeps at a place. The compiler hands out places; one where nothing is kept is a bug. */
export function keptAt<T>(values: readonly T[], place: number): T {
  const value = values[place];
  if (value === undefined) throw new RangeError(`nothing is kept at place ${place}`);
  return value;
}

/** What is known by a name that the plan has been checked to have. */
export function knownAs<T>(known: ReadonlyMap<string, T>, name: string): T {
  const value = known.get(name);
  if (value === undefined) throw new RangeError(`nothing is known as ${name}`);
  return value;
}
