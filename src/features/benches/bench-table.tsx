import { Link } from 'react-router-dom';
import { geometryWords } from '#src/ui/bench-line.tsx';
import { Measured } from '#src/ui/measured.tsx';
import { Table, type Column } from '#src/ui/table.tsx';
import type { Bench } from '#shared/contracts/benches.ts';

const columns: readonly Column<Bench>[] = [
  {
    key: 'name',
    head: 'Bench',
    cell: (b) => (
      <>
        {b.can.edit ? (
          <Link to={`/benches/${b.id}`} className="pressable-link inline-flex min-h-6 items-center">
            {b.name}
          </Link>
        ) : (
          b.name
        )}
        {b.note ? <span className="block max-w-72 font-[500] text-ink2">{b.note}</span> : null}
      </>
    ),
  },
  { key: 'geometry', head: 'Geometry', cell: (b) => geometryWords[b.geometry] },
  {
    key: 'wavelength',
    head: 'Wavelength',
    right: true,
    cell: (b) => <Measured {...b.wavelength} unit="nm" />,
  },
  {
    key: 'distance',
    head: 'Distance or focal length',
    right: true,
    cell: (b) => <Measured {...b.distance} unit="mm" />,
  },
  {
    key: 'pitch',
    head: 'Length per pixel',
    right: true,
    cell: (b) => <Measured {...b.pixelPitch} unit="um" />,
  },
  {
    key: 'camera',
    head: 'Camera',
    wideOnly: true,
    cell: (b) =>
      `${b.bitDepth} bit, ${b.encoding === 'srgb' ? 'sRGB' : 'linear'}, dark level ${b.darkLevel ?? 'not known'}${b.mirrored ? ', mirrored' : ''}`,
  },
];

export function BenchTable({ benches }: { benches: readonly Bench[] }) {
  return <Table caption="Benches; U with k = 2" columns={columns} rows={benches} rowKey={(b) => b.id} />;
}
