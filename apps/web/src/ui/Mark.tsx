/** Our mark: light spreading from its source. */
export function Mark({ size = 26 }: { size?: number }) {
  return (
    <svg width={size} height={size} viewBox="0 0 26 26" aria-hidden="true" style={{ display: 'block', flex: 'none' }}>
      <g fill="none" stroke="var(--fw-palette-faintward-accent)" strokeWidth="2">
        <path d="M3 21 A18 18 0 0 1 21 3" />
        <path d="M3 21 A11 11 0 0 1 14 10" opacity=".65" />
      </g>
      <circle cx="4" cy="21" r="2.6" fill="var(--fw-palette-primary-main)" />
    </svg>
  );
}
