import { useCallback, useState } from 'react';
import { CYCLE_COLUMNS } from './cycle-columns.tsx';

/** The columns a person chose to see, kept in this browser. `place` keeps the phone's choice apart from the desk's. */
export function useChosenColumns(place: string, first: readonly string[]): [string[], (id: string) => void] {
  const key = `gablebook.cycles.columns.${place}`;
  const [chosen, setChosen] = useState<string[]>(() => read(key) ?? [...first]);
  const toggle = useCallback(
    (id: string) => {
      setChosen((before) => {
        const after = before.includes(id) ? before.filter((one) => one !== id) : [...before, id];
        write(key, after);
        return after;
      });
    },
    [key],
  );
  return [chosen, toggle];
}

function read(key: string): string[] | null {
  try {
    const value: unknown = JSON.parse(window.localStorage.getItem(key) ?? 'null');
    if (!Array.isArray(value)) return null;
    const known = new Set(CYCLE_COLUMNS.map((column) => column.id));
    return value.filter((id): id is string => typeof id === 'string' && known.has(id));
  } catch {
    // Storage may be refused or hold something else; the first columns will do.
    return null;
  }
}

function write(key: string, value: string[]): void {
  try {
    window.localStorage.setItem(key, JSON.stringify(value));
  } catch {
    // Without storage the choice lasts until the page is left.
  }
}
