/** What the engine knows of the constants of a basis: notation and weight. */
import { useEffect, useState } from 'react';
import type { BasisElementView } from '../../src/worker/messages.ts';
import { quickEngine } from '../engine.ts';

/** Null until the engine has answered. The last answer is kept for the constants that stay. */
export function useElements(basis: readonly string[]): readonly BasisElementView[] | null {
  const [known, setKnown] = useState<ReadonlyMap<string, BasisElementView>>(new Map());
  const key = basis.join('\n');
  useEffect(() => {
    if (key === '') return;
    const controller = new AbortController();
    const texts = key.split('\n');
    quickEngine.call('basis', { basis: texts }, { signal: controller.signal }).then(
      ({ elements }) => setKnown(new Map(elements.map((element, k) => [texts[k] ?? '', element]))),
      () => undefined,
    );
    return () => controller.abort();
  }, [key]);
  const found = basis.map((text) => known.get(text));
  return found.some((element) => element === undefined) ? null : (found as BasisElementView[]);
}
