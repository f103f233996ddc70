/** Copies text and says so where it was pressed and to a screen reader. */
import { useEffect, useState } from 'react';
import { useBench } from '../state/react.ts';

export function CopyButton({ label, text, primary = false }: { label: string; text: string; primary?: boolean }) {
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
      announce('The browser did not allow copying; select the text and copy it by hand.');
    }
  };
  const word = state === 'copied' ? 'Copied' : state === 'failed' ? 'Not allowed' : label;
  return (
    <button type="button" className={primary ? 'primary copy' : 'copy'} onClick={copy} data-state={state}>
      {word}
      {state === 'copied' && <span aria-hidden="true"> ✓</span>}
    </button>
  );
}
