/** Digits used against digits to which the relation then found agrees: a real relation keeps the whole height, a chance one falls to the line of slope one. */
import type { Evidence } from '../../src/evidence/evidence.ts';

const WIDTH = 360;
const HEIGHT = 190;
const LEFT = 40;
const BOTTOM = 34;
const TOP = 12;
const RIGHT = 14;

export function AgreementPlot({ evidence }: { evidence: Evidence }) {
  const points = [
    ...evidence.stability.map((p) => ({ used: p.digitsUsed, agree: p.agreementDigits })),
    { used: evidence.digits.used, agree: Math.min(evidence.agreementDigits, evidence.digits.trusted) },
  ].sort((a, b) => a.used - b.used);
  const top = Math.max(10, evidence.digits.trusted);
  const x = (digits: number): number => LEFT + (digits / top) * (WIDTH - LEFT - RIGHT);
  const y = (digits: number): number => HEIGHT - BOTTOM - (digits / top) * (HEIGHT - BOTTOM - TOP);
  const budget = Math.max(0, evidence.vectorsLog10);
  const ticks = [0, Math.round(top / 2), top];
  const sentence = points
    .map((p) => `with ${p.used} digits used the relation agrees to ${Math.floor(p.agree)}`)
    .join('; ');
  return (
    <figure className="plot">
      <svg
        className="plot-picture"
        viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
        role="img"
        aria-label={`Agreement plot: ${sentence}. Chance alone could give ${Math.ceil(budget)} digits.`}
      >
        <rect x={x(0)} y={y(budget)} width={x(top) - x(0)} height={y(0) - y(budget)} className="plot-chance" />
        <path d={`M${x(0)} ${y(0)}L${x(top)} ${y(top)}`} className="plot-slope" />
        {ticks.map((t) => (
          <g key={t}>
            <text x={x(t)} y={HEIGHT - BOTTOM + 14} textAnchor="middle">
              {t}
            </text>
            <text x={LEFT - 6} y={y(t) + 4} textAnchor="end">
              {t}
            </text>
          </g>
        ))}
        <path d={`M${x(0)} ${y(top) - 2}V${y(0)}H${x(top)}`} className="plot-axis" />
        {points.length > 1 && (
          <path d={`M${points.map((p) => `${x(p.used)} ${y(p.agree)}`).join('L')}`} className="plot-line" />
        )}
        {points.map((p) => (
          <circle key={p.used} cx={x(p.used)} cy={y(p.agree)} r="4.5" className="plot-point" />
        ))}
        <text x={(x(0) + x(top)) / 2} y={HEIGHT - 4} textAnchor="middle">
          digits used
        </text>
        <text transform={`translate(11 ${(y(0) + y(top)) / 2}) rotate(-90)`} textAnchor="middle">
          digits agreed
        </text>
        <text x={x(top) - 4} y={y(budget) + 13} textAnchor="end">
          {budget > top / 9 ? 'within reach of chance' : ''}
        </text>
      </svg>
      <figcaption>
        Digits agreed against digits used. Above the diagonal the relation predicts digits that its search did not see.
      </figcaption>
    </figure>
  );
}
