import { useRef, useState, type DragEvent } from 'react';
import { Link } from 'react-router-dom';
import { keepChoice, useKeptChoice } from '#src/lib/kept.ts';
import { useKeys } from '#src/lib/keys.ts';
import { BenchLine } from '#src/ui/bench-line.tsx';
import { Button } from '#src/ui/button.tsx';
import { classNames } from '#src/ui/class-names.ts';
import { TextField } from '#src/ui/field.tsx';
import { LaserCautions } from '#src/ui/laser-cautions.tsx';
import { Select } from '#src/ui/select.tsx';
import { UploadRow } from '#src/features/exposures/upload-row.tsx';
import { useUploads } from '#src/features/exposures/use-uploads.ts';
import type { Bench } from '#shared/contracts/benches.ts';
import { pictureLimits } from '#shared/contracts/exposures.ts';

interface UploadPanelProps {
  caseId: string;
  benches: readonly Bench[];
}

const keptBench = 'fringeward.bench';
const accepted = '.png,.tif,.tiff,.jpg,.jpeg,.bmp';

/** Bench first, then the pictures by drop or choice; each is identified as soon as it has arrived. */
export function UploadPanel({ caseId, benches }: UploadPanelProps) {
  const uploads = useUploads(caseId);
  const kept = useKeptChoice(keptBench);
  const bench = benches.find((b) => b.id === kept) ?? (benches.length === 1 ? benches[0] : undefined);
  const [note, setNote] = useState('');
  const [wanted, setWanted] = useState(false);
  const [over, setOver] = useState(false);
  const input = useRef<HTMLInputElement>(null);

  const take = (files: FileList | null) => {
    if (!files || files.length === 0) return;
    if (!bench) return setWanted(true);
    uploads.add([...files], bench.id, note);
  };
  const choose = () => (bench ? input.current?.click() : setWanted(true));
  useKeys([{ keys: 'u', label: 'add exposures', run: choose }]);

  const drag = (event: DragEvent) => {
    event.preventDefault();
    setOver(event.type === 'dragover');
  };
  if (benches.length === 0)
    return (
      <p>
        No bench is saved yet, and without its values nothing can be measured.{' '}
        <Link to="/benches/new" className="pressable-link">
          Add a bench
        </Link>
      </p>
    );
  return (
    <div className="space-y-4">
      <Select
        label="Bench that the exposures are taken on"
        options={[
          ...(bench ? [] : [{ value: '', label: 'Choose a bench' }]),
          ...benches.map((b) => ({ value: b.id, label: b.name })),
        ]}
        value={bench?.id ?? ''}
        onChange={(event) => {
          keepChoice(keptBench, event.target.value);
          setWanted(false);
        }}
        error={wanted && !bench ? 'Choose the bench first: its values go with every exposure.' : undefined}
      />
      {bench ? (
        <p className="text-ink2">
          <BenchLine bench={bench} />
        </p>
      ) : null}
      <TextField
        label="Note for the exposures"
        value={note}
        maxLength={300}
        onChange={(event) => setNote(event.target.value)}
        hint="Optional: exposure time, position, filter."
      />
      <LaserCautions wavelength={bench?.wavelength.value ?? null} />
      <div
        onDragOver={drag}
        onDragLeave={drag}
        onDrop={(event) => {
          drag(event);
          take(event.dataTransfer.files);
        }}
        className={classNames(
          'flex min-h-28 flex-col items-start justify-center gap-2 border border-dashed px-5 py-4',
          over ? 'border-ink bg-raised' : 'border-edge',
        )}
      >
        <p className="reading">Drop exposures here</p>
        <Button look="ink" small keyHint="u" onClick={choose}>
          Choose pictures
        </Button>
        <input
          ref={input}
          type="file"
          multiple
          accept={accepted}
          aria-label="Pictures of the pattern"
          className="sr-only"
          tabIndex={-1}
          onChange={(event) => {
            take(event.target.files);
            event.target.value = '';
          }}
        />
        <p className="label text-ink3">
          PNG or TIFF of 8 or 16 bit, JPEG, BMP; up to {pictureLimits.bytes / 2 ** 20} MiB and{' '}
          {pictureLimits.pixels / 1e6} million pixels each. Several at once, one bench for all.
        </p>
      </div>
      {uploads.items.length > 0 ? (
        <ul className="space-y-2" aria-label="Files on their way">
          {uploads.items.map((item) => (
            <UploadRow
              key={item.id}
              item={item}
              onSendAgain={() => uploads.sendAgain(item.id)}
              onLeaveOut={() => uploads.leaveOut(item.id)}
            />
          ))}
        </ul>
      ) : null}
    </div>
  );
}
