/** The product's sign: rows of digits above, the bead that assaying leaves below. */
export function Mark() {
  return (
    <svg className="brand-mark" viewBox="0 0 64 64" width="30" height="30" aria-hidden="true">
      <path d="M20 3h24l17 17v24L44 61H20L3 44V20z" className="brand-ground" />
      <path d="M15 20h9M28 20h9M41 20h8M15 30h9M28 30h9" className="brand-digits" />
      <path d="M13 47c9 0 10-9 18-9 6 0 8 4 11 6" className="brand-streak" />
      <circle cx="46" cy="45" r="5.5" className="brand-bead" />
    </svg>
  );
}
