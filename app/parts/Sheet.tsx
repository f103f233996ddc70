/** One part of the lab sheet: its number and name in the margin with a few figures, its matter beside them. */
import { type ReactNode, useId } from 'react';

export function Sheet({
  step,
  title,
  figures = [],
  kind = '',
  children,
}: {
  step: number;
  title: string;
  /** Short facts for the margin. */
  figures?: readonly string[];
  /** `in-sight` keeps the part at the foot of the window while its place lies below. */
  kind?: '' | 'in-sight';
  children: ReactNode;
}) {
  const id = useId();
  return (
    <section className={`sheet ${kind}`.trim()} aria-labelledby={id}>
      <header className="margin">
        <h2 id={id}>
          <span className="step" aria-hidden="true">
            {step}
          </span>
          {title}
        </h2>
        {figures.length > 0 && (
          <ul className="figures">
            {figures.map((figure) => (
              <li key={figure}>{figure}</li>
            ))}
          </ul>
        )}
      </header>
      <div className="matter">{children}</div>
    </section>
  );
}
