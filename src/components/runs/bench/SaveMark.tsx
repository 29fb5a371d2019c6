import type { ReactElement } from 'react';
import { Button } from '@/components/ui/Button';
import { Notice } from '@/components/ui/Notice';
import type { OutboxState } from '@/lib/client/outbox';
import { paths } from '@/lib/paths';
import { savingWords } from './words';

/** Whether everything typed is on the server: a square that is filled when it is. */
export function SaveMark({ state }: { state: OutboxState }): ReactElement {
  const saved = state.is === 'saved';
  const fill = saved
    ? 'border-verdigris bg-verdigris'
    : state.is === 'stopped'
      ? 'border-vermilion'
      : 'border-ink hatched';
  return (
    <span className="inline-flex items-center gap-2 text-sm" role="status" data-saving={state.is}>
      <span className={`size-3 shrink-0 border-2 ${fill}`} aria-hidden="true" />
      {savingWords(state)}
    </span>
  );
}

interface Props {
  readonly state: OutboxState;
  readonly here: string;
  readonly onAgain: () => void;
  readonly onPutAfter: () => void;
  readonly onDiscard: () => void;
}

/** What the server refused, and the ways on. Nothing typed is lost until somebody says so. */
export function Stopped({ state, here, onAgain, onPutAfter, onDiscard }: Props): ReactElement | null {
  if (state.is !== 'stopped') return null;
  const out = state.why === 'signed-out';
  return (
    <Notice kind="refused" title={out ? 'You are signed out' : 'The server did not take this'}>
      <p>
        {out ? '' : `${state.detail} `}
        What you typed is kept on this device ({state.waiting}).
      </p>
      <div className="mt-3 flex flex-wrap gap-2">
        {out && (
          <a
            className="link inline-flex min-h-11 items-center pr-3"
            href={paths.signIn(here)}
            target="_blank"
            rel="noopener"
          >
            Sign in, in a new tab
          </a>
        )}
        {state.why === 'taken' && <Button onClick={onPutAfter}>Load the run, put mine after it</Button>}
        {state.why !== 'taken' && <Button onClick={onAgain}>Try again</Button>}
        {!out && (
          <Button variant="danger" onClick={onDiscard}>
            Load the run, drop mine
          </Button>
        )}
      </div>
    </Notice>
  );
}
