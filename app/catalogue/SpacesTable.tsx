/** The spaces that a basis can be chosen from, with their dimensions. */
import type { CatalogueSpace } from '../../src/search/catalogue.ts';
import { Formula } from '../parts/Formula.tsx';

export function SpacesTable({ spaces }: { spaces: readonly CatalogueSpace[] }) {
  const most = Math.max(...spaces.map((s) => s.maxWeight));
  const weights = Array.from({ length: most + 1 }, (_, w) => w);
  return (
    <section aria-labelledby="spaces-heading">
      <h2 id="spaces-heading">Spaces</h2>
      {/* biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls sideways must be reachable by keyboard */}
      <section className="scroll" tabIndex={0} aria-label="Dimensions of the spaces by weight">
        <table>
          <thead>
            <tr>
              <th scope="col">Space</th>
              {weights.map((w) => (
                <th scope="col" className="number" key={w}>
                  {w}
                </th>
              ))}
              <th scope="col">Dimension</th>
            </tr>
          </thead>
          <tbody>
            {spaces.map((space) => (
              <tr key={space.key}>
                <th scope="row">
                  {space.title}
                  <span className="note">letters {space.alphabet}</span>
                </th>
                {weights.map((w) => (
                  <td className="number mono" key={w}>
                    {space.dimensions[w] ?? ''}
                  </td>
                ))}
                <td>
                  <Formula latex={space.dimensionFormula} text={space.dimensionFormula} />
                  <span className="note">
                    {space.status}; {space.source}
                  </span>
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      </section>
    </section>
  );
}
