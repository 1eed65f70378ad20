import { useCallback, useSyncExternalStore } from 'react';

/** Whether a media query holds, followed as it changes. */
export function useMedia(query: string): boolean {
  const subscribe = useCallback(
    (changed: () => void) => {
      const list = window.matchMedia(query);
      list.addEventListener('change', changed);
      return () => list.removeEventListener('change', changed);
    },
    [query],
  );
  return useSyncExternalStore(subscribe, () => window.matchMedia(query).matches);
}

/** The width at which ruled tables turn into label and value rows. */
export function usePhone(): boolean {
  return useMedia('(max-width: 640px)');
}
