import type { BenchGeometry } from '#shared/contracts/benches.ts';

/** The bench as light travels: laser, opening, distance (or lens), sensor (or screen and camera). */
export function BenchDrawing({ geometry }: { geometry: BenchGeometry }) {
  const orders = [-4, -3, -2, -1, 1, 2, 3, 4];
  const end = geometry === 'lens' ? 560 : 1010;
  return (
    <svg viewBox="0 0 1200 130" className="block w-full max-lg:hidden" aria-hidden="true">
      <rect x="0" y="45" width="120" height="36" fill="var(--plate)" stroke="var(--edge)" />
      <path d="M120 63H360" stroke="var(--bad)" strokeWidth="9" opacity="0.75" />
      <circle cx="120" cy="63" r="5" fill="var(--open)" stroke="var(--edge)" />
      <g fill="var(--bad)">
        {orders.map((n) => (
          <path
            key={n}
            d={`M372 ${63 + n * 1.1}L${end} ${63 + n * 13 - 3.5}v7z`}
            opacity={0.5 / Math.abs(n) ** 0.9}
          />
        ))}
        <path d={`M372 59L${end} 52v22L372 67z`} opacity="0.75" />
        {geometry === 'lens' ? (
          <>
            {orders.map((n) => (
              <path
                key={n}
                d={`M560 ${63 + n * 13 - 3.5}v7L1010 ${63 + n * 12}z`}
                opacity={0.5 / Math.abs(n) ** 0.9}
              />
            ))}
            <path d="M560 52L1010 61v4L560 74z" opacity="0.75" />
          </>
        ) : null}
      </g>
      <path d="M366 8v50M366 68v50" stroke="var(--plate)" strokeWidth="12" />
      <path d="M360 8h12v50h-12zM360 68h12v50h-12z" fill="none" stroke="var(--edge)" />
      {geometry === 'lens' ? (
        <path
          d="M560 4c16 36 16 82 0 118c-16-36-16-82 0-118z"
          fill="var(--model-wash)"
          stroke="var(--edge)"
          strokeWidth="1.5"
        />
      ) : null}
      {geometry === 'screen' ? (
        <>
          <path d="M1014 2v122" stroke="var(--ink)" strokeWidth="5" />
          <path d="M1008 4 880 96M1008 122 880 104" stroke="var(--edge)" strokeDasharray="3 4" fill="none" />
          <path d="M840 90h34v22h-34zM874 95l9-3v18l-9-3z" fill="var(--plate)" stroke="var(--edge)" />
        </>
      ) : (
        <>
          <rect x="1014" y="6" width="16" height="114" fill="var(--plate)" stroke="var(--edge)" />
          <path d="M1012 8v110" stroke="var(--edge)" strokeWidth="4" strokeDasharray="2 4" />
        </>
      )}
    </svg>
  );
}
