import { useQueryClient } from '@tanstack/react-query';
import { useCallback, useEffect, useRef, useState } from 'react';
import { ApiProblem, asProblem } from '#src/lib/problem.ts';
import { upload } from '#src/lib/upload.ts';
import { pictureLimits, uploadExposure } from '#shared/contracts/exposures.ts';
import { problems } from '#shared/problems.ts';

export interface UploadItem {
  readonly id: number;
  readonly file: File;
  readonly benchId: string;
  readonly note: string;
  readonly state: 'waiting' | 'sending' | 'refused';
  /** Share of the bytes sent. */
  readonly share: number;
  readonly problem: ApiProblem | null;
}

/** As many at once as a bench computer's line carries well. */
const atOnce = 2;
let counter = 0;

/** Said before a byte is sent: the server would say the same. */
function refusedUnseen(file: File): ApiProblem | null {
  const refuse = (code: 'file-empty' | 'file-too-large', detail: string) =>
    new ApiProblem(code, problems[code].status, problems[code].title, detail);
  if (file.size === 0)
    return refuse('file-empty', 'Nothing was stored. Export the picture again from the camera’s program.');
  if (file.size > pictureLimits.bytes)
    return refuse(
      'file-too-large',
      `It has ${(file.size / 2 ** 20).toFixed(0)} MiB, the limit is ${pictureLimits.bytes / 2 ** 20} MiB. Crop it about the pattern or bin its pixels.`,
    );
  return null;
}

/** The files on their way into a case. A stored one leaves the list; a refused one keeps its place. */
export function useUploads(caseId: string) {
  const client = useQueryClient();
  const [items, setItems] = useState<readonly UploadItem[]>([]);
  const running = useRef(new Map<number, AbortController>());

  const change = useCallback((id: number, part: Partial<UploadItem>) => {
    setItems((all) => all.map((item) => (item.id === id ? { ...item, ...part } : item)));
  }, []);

  const send = useCallback(
    async (item: UploadItem) => {
      const stop = new AbortController();
      running.current.set(item.id, stop);
      try {
        const unseen = refusedUnseen(item.file);
        if (unseen) throw unseen;
        await upload(uploadExposure, {
          params: { caseId },
          fields: { benchId: item.benchId, note: item.note },
          file: item.file,
          onProgress: (share) => change(item.id, { share }),
          signal: stop.signal,
        });
        await client.invalidateQueries({ queryKey: ['cases'] });
        setItems((all) => all.filter((other) => other.id !== item.id));
      } catch (error) {
        if (stop.signal.aborted) return;
        const problem = asProblem(error);
        if (problem.code === 'not-signed-in') void client.invalidateQueries({ queryKey: ['session'] });
        change(item.id, { state: 'refused', problem });
      } finally {
        running.current.delete(item.id);
      }
    },
    [caseId, change, client],
  );

  useEffect(() => {
    const free = atOnce - items.filter((item) => item.state === 'sending').length;
    const next = items.filter((item) => item.state === 'waiting').slice(0, Math.max(0, free));
    for (const item of next) {
      if (running.current.has(item.id)) continue;
      change(item.id, { state: 'sending', share: 0, problem: null });
      void send(item);
    }
  }, [items, send, change]);

  const busy = items.some((item) => item.state !== 'refused');
  useEffect(() => {
    if (!busy) return;
    const warn = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener('beforeunload', warn);
    return () => window.removeEventListener('beforeunload', warn);
  }, [busy]);

  return {
    items,
    add: (files: readonly File[], benchId: string, note: string) =>
      setItems((all) => [
        ...all,
        ...files.map((file) => ({
          id: ++counter,
          file,
          benchId,
          note,
          state: 'waiting' as const,
          share: 0,
          problem: null,
        })),
      ]),
    sendAgain: (id: number) => change(id, { state: 'waiting', share: 0, problem: null }),
    leaveOut: (id: number) => {
      running.current.get(id)?.abort();
      setItems((all) => all.filter((item) => item.id !== id));
    },
  };
}
