/** A large number as mantissa and power of ten. */
export function Power({ log10 }: { log10: number }) {
  if (log10 < 5) return <>{Math.floor(10 ** log10).toLocaleString('en')}</>;
  const exponent = Math.floor(log10);
  const lead = Math.floor(10 ** (log10 - exponent) * 10) / 10;
  return (
    <span className="power">
      {lead.toFixed(1)} × 10<sup>{exponent}</sup>
    </span>
  );
}
