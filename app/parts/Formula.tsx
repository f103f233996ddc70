/** A typeset formula; a short one is read out as its typed text, a displayed one as MathML. KaTeX is loaded when the first one is shown; until then, and if it fails, the typed text stands there. */
import { useEffect, useState } from 'react';
import { typeset, typesetBefore } from './typeset.ts';

export function Formula({ latex, text, display = false }: { latex: string; text: string; display?: boolean }) {
  const [, redraw] = useState(0);
  const html = typesetBefore(latex, display);
  useEffect(() => {
    if (html !== undefined) return;
    let live = true;
    typeset(latex, display).then(() => live && redraw((n) => n + 1));
    return () => {
      live = false;
    };
  }, [latex, display, html]);
  if (html === undefined || html === null) return <code className="formula-text">{text}</code>;
  return (
    <span className={display ? 'formula display' : 'formula'}>
      {/* biome-ignore lint/security/noDangerouslySetInnerHtml: KaTeX output, made with trust off */}
      <span dangerouslySetInnerHTML={{ __html: html }} />
      {!display && <span className="visually-hidden">{text}</span>}
    </span>
  );
}
