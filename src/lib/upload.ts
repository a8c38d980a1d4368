import type { z } from 'zod';
import { address } from '#src/lib/address.ts';
import { readProblem, unreachable, unreadableAnswer } from '#src/lib/problem.ts';
import type { Endpoint } from '#shared/contracts/endpoint.ts';

interface Upload<E extends Endpoint> {
  params: z.input<E['params']>;
  fields: Record<string, string>;
  file: File;
  /** Share of the bytes sent, 0 … 1. */
  onProgress: (share: number) => void;
  signal: AbortSignal;
}

/** Sends one file with its form fields; XMLHttpRequest, because fetch tells nothing about bytes sent. Throws `ApiProblem`. */
export function upload<E extends Endpoint>(endpoint: E, job: Upload<E>): Promise<z.output<E['response']>> {
  return new Promise((resolve, reject) => {
    const request = new XMLHttpRequest();
    request.open(endpoint.method, address(endpoint, job.params));
    request.upload.onprogress = (event) => {
      if (event.lengthComputable && event.total > 0) job.onProgress(event.loaded / event.total);
    };
    request.onload = () => {
      if (request.status < 200 || request.status >= 300)
        return reject(readProblem(request.status, request.responseText));
      const parsed = endpoint.response.safeParse(parseJson(request.responseText));
      if (parsed.success) resolve(parsed.data as z.output<E['response']>);
      else reject(unreadableAnswer(request.status));
    };
    request.onerror = () => reject(unreachable());
    request.onabort = () => reject(new DOMException('The upload was stopped.', 'AbortError'));
    job.signal.addEventListener('abort', () => request.abort(), { once: true });
    const form = new FormData();
    for (const [key, value] of Object.entries(job.fields)) form.append(key, value);
    form.append('file', job.file, job.file.name);
    request.send(form);
  });
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return undefined;
  }
}
