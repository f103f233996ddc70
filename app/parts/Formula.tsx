/** A typeset formula. KaTeX is loaded when the first one is shown; until then, and if it fails, the typed text stands there. */
import { useEffect, useState } from 'react';

interface Typesetter {
  renderToString(latex: string, options: object): string;
}

let loading: Promise<Typesetter> | undefined;

function loadTypesetter(): Promise<Typesetter> {
  loading ??= Promise.all([import('katex'), import('katex/dist/katex.min.css')]).then(([katex]) => katex.default);
  return loading;
}

export function Formula({ latex, text, display = false }: { latex: string; text: string; display?: boolean }) {
  const [html, setHtml] = useState<string | null>(null);
  useEffect(() => {
    let live = true;
    loadTypesetter().then(
      (katex) => {
        if (!live) return;
        try {
          setHtml(
            katex.renderToString(latex, { displayMode: display, throwOnError: true, trust: false, strict: 'ignore' }),
          );
        } catch {
          setHtml(null);
        }
      },
      () => undefined,
    );
    return () => {
      live = false;
    };
  }, [latex, display]);
  if (html === null) return <code className="formula-text">{text}</code>;
  // biome-ignore lint/security/noDangerouslySetInnerHtml: KaTeX output, made with trust off
  return <span className={display ? 'formula display' : 'formula'} dangerouslySetInnerHTML={{ __html: html }} />;
}
