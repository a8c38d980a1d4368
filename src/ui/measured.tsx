import { printParts, type Unit } from '#shared/quantities.ts';

interface MeasuredProps {
  /** SI */
  value: number;
  /** Standard uncertainty, SI; printed as U = 2u. */
  u: number;
  unit: Unit;
  /** Leave the unit to a later quantity of the same line. */
  bareUnit?: boolean;
}

/** Value bold, ± U lighter and attached to it; U is expanded, k = 2, which the place of use says once. */
export function Measured({ value, u, unit, bareUnit }: MeasuredProps) {
  const p = printParts(value, u, unit);
  const degree = unit === 'deg';
  return (
    <span className="whitespace-nowrap">
      <b className="font-[740]">
        {p.value}
        {degree ? '°' : ''}
      </b>
      <span className="font-[420] text-ink2">
        {'\u00a0±\u00a0'}
        {p.expanded}
        {degree ? '°' : ''}
      </span>
      {degree || bareUnit ? '' : `\u00a0${p.unit}`}
    </span>
  );
}
