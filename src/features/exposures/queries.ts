import { queryOptions } from '@tanstack/react-query';
import { call, callForBytes } from '#src/lib/call.ts';
import { getExposure, getExposurePixels } from '#shared/contracts/exposures.ts';

/** One exposure; asks again while its newest identification is under way. */
export function exposureQuery(exposureId: string) {
  return queryOptions({
    queryKey: ['exposures', exposureId],
    queryFn: ({ signal }) => call(getExposure, { params: { exposureId }, signal }),
    refetchInterval: (query) => {
      const state = query.state.data?.latest?.state;
      return state === 'queued' || state === 'running' ? 1_500 : false;
    },
  });
}

/** The measured plane of codes. Never changes, so it is fetched once. */
export function pixelsQuery(exposureId: string) {
  return queryOptions({
    queryKey: ['exposures', exposureId, 'pixels'],
    queryFn: async ({ signal }) =>
      readCodes(await callForBytes(getExposurePixels, { params: { exposureId }, signal })),
    staleTime: Number.POSITIVE_INFINITY,
    gcTime: 60_000,
  });
}

/** Unsigned 16 bits, little endian. */
function readCodes(bytes: ArrayBuffer): Uint16Array {
  const view = new DataView(bytes);
  const codes = new Uint16Array(bytes.byteLength / 2);
  for (let i = 0; i < codes.length; i++) codes[i] = view.getUint16(2 * i, true);
  return codes;
}
