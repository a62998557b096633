import { paths } from '../../lib/paths.ts';
import { Time } from '../../ui/time.tsx';
import type { SyncState } from './sheet-sync.ts';

/** Where what was typed is, in one line; said politely when it changes. */
export function SavedState({ state }: { readonly state: SyncState }) {
  return (
    <output className="small block">
      <Words state={state} />
    </output>
  );
}

function Words({ state }: { readonly state: SyncState }) {
  switch (state.kind) {
    case 'saved':
      return (
        <>
          <b>Saved</b> <Time iso={state.at} style="time" />, here and at school
        </>
      );
    case 'saving':
      return (
        <>
          <b>Saving…</b> kept in this browser
        </>
      );
    case 'offline':
      return (
        <>
          <b>Kept in this browser, offline.</b> It is sent when the connection is back.
        </>
      );
    case 'signed-out':
      return (
        <>
          <b>Kept in this browser.</b> You are signed out:{' '}
          <a href={paths.signIn(location.pathname)} target="_blank" rel="noreferrer">
            sign in in a new window
          </a>
          , then go on here.
        </>
      );
    case 'refused':
      return (
        <>
          <b>Kept in this browser only.</b> {state.detail}
        </>
      );
    case 'conflict':
      return (
        <>
          <b>Changed in two windows.</b> Both are kept; choose below.
        </>
      );
  }
}
