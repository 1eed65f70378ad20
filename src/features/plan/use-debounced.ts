import { useEffect, useState } from 'react';

/** A value once it has stood still for a while. */
export function useDebounced<T>(value: T, milliseconds: number): T {
  const [still, setStill] = useState(value);
  useEffect(() => {
    const timer = setTimeout(() => setStill(value), milliseconds);
    return () => clearTimeout(timer);
  }, [value, milliseconds]);
  return still;
}
