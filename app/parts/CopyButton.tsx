/** Copies text and says so where it was pressed and to a screen reader. */
import { useEffect, useState } from 'react';
import { useBench } from '../state/react.ts';

export function CopyButton({ label, text }: { label: string; text: string }) {
  const [state, setState] = useState<'idle' | 'copied' | 'failed'>('idle');
  const announce = useBench((s) => s.announce);
  useEffect(() => {
    if (state === 'idle') return;
    const timer = setTimeout(() => setState('idle'), 2500);
    return () => clearTimeout(timer);
  }, [state]);
  const copy = async (): Promise<void> => {
    try {
      await navigator.clipboard.writeText(text);
      setState('copied');
      announce(`${label.replace(/^Copy /, '')} copied.`);
    } catch {
      setState('failed');
      announce('The browser did not allow copying.');
    }
  };
  return (
    <button type="button" onClick={copy} data-state={state}>
      {state === 'copied' ? '✓ Copied' : state === 'failed' ? 'Not allowed' : label}
    </button>
  );
}
