/** Which place of the app the address names: `#catalogue`, or the bench. */
import { useSyncExternalStore } from 'react';

export type Place = 'bench' | 'catalogue';

function placeNow(): Place {
  return location.hash === '#catalogue' ? 'catalogue' : 'bench';
}

function onChange(listener: () => void): () => void {
  addEventListener('hashchange', listener);
  return () => removeEventListener('hashchange', listener);
}

export function usePlace(): Place {
  return useSyncExternalStore(onChange, placeNow);
}
