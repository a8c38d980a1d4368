/** The product's mark: disc turned 28°, measured half solid, model half arcs, the seam across. */
export function Mark({ size = 26 }: { size?: number }) {
  return (
    <svg viewBox="0 0 26 26" width={size} height={size} aria-hidden="true" className="shrink-0">
      <g transform="rotate(-28 13 13)">
        <path d="M2.5 12.4a10.5 10.5 0 0 1 21 0z" fill="var(--ink)" />
        <g fill="none" stroke="var(--ink)" strokeWidth="1.7">
          <path d="M3.3 14.6a9.7 9.7 0 0 0 19.4 0M6.8 14.6a6.2 6.2 0 0 0 12.4 0M10.2 14.6a2.8 2.8 0 0 0 5.6 0" />
        </g>
        <path d="M0 13.5h26" stroke="var(--seam)" strokeWidth="1.8" />
      </g>
    </svg>
  );
}
