import { queryOptions } from '@tanstack/react-query';
import type { HandInPreview, MendView, SaveAnswer, SaveSheet, SheetView } from '../../../shared/schemas/derivation.ts';
import { api } from '../../lib/api.ts';

const sheetPath = (roundId: string) => `/api/rounds/${encodeURIComponent(roundId)}/sheet`;
const mendPath = (derivationId: string) => `/api/derivations/${encodeURIComponent(derivationId)}/mend`;

/** The own sheet in a round. */
export function sheetQuery(roundId: string) {
  return queryOptions({
    queryKey: ['sheet', roundId],
    queryFn: ({ signal }) => api.get<SheetView>(sheetPath(roundId), { signal }),
    staleTime: 0,
    // The editor goes on from what the server has now, never from what it had when the page was left.
    gcTime: 0,
  });
}

export const saveSheet = (roundId: string, body: SaveSheet) => api.put<SaveAnswer>(sheetPath(roundId), body);
export const previewHandIn = (roundId: string) => api.get<HandInPreview>(`${sheetPath(roundId)}/preview`);
export const handInSheet = (roundId: string, draftVersion: number) =>
  api.post<SheetView>(`${sheetPath(roundId)}/hand-in`, { draftVersion });
export const takeBackSheet = (roundId: string) => api.post<SheetView>(`${sheetPath(roundId)}/take-back`);

const CHECKING_MS = 2_000;

/** The mend of a derivation; asked for again while it is being checked. */
export function mendQuery(derivationId: string) {
  return queryOptions({
    queryKey: ['mend', derivationId],
    queryFn: ({ signal }) => api.get<MendView>(mendPath(derivationId), { signal }),
    staleTime: 0,
    refetchInterval: ({ state }) => (state.data?.handedIn && !state.data.handedIn.verdict ? CHECKING_MS : false),
  });
}

export const saveMend = (derivationId: string, body: SaveSheet) => api.put<SaveAnswer>(mendPath(derivationId), body);
export const handInMend = (derivationId: string, draftVersion: number) =>
  api.post<MendView>(`${mendPath(derivationId)}/hand-in`, { draftVersion });
