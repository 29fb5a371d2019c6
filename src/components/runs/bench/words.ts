import type { LadderRow } from '@/components/ladder/rows';
import { readingSentences } from '@/components/ladder/words';
import type { OutboxState } from '@/lib/client/outbox';
import { counted } from '../summary';
import type { Entry } from './console';

/** What Enter does next, in large type. */
export function nextWords({ asking, way, times }: Entry): string {
  switch (asking) {
    case 'reading':
      return `Turn, ${way}, ${times === 1 ? 'once' : `${times.toLocaleString('en-GB')} times`}`;
    case 'slides':
      return 'Set the slides';
    case 'carriage':
      return 'Shift the carriage';
    case 'times':
      return 'How many turns?';
    case 'clear':
      return 'Clear';
    case 'note':
      return 'Note for the next step';
  }
}

export const LINE_LABELS: Record<Entry['asking'], string> = {
  reading: 'What stands in the windows',
  slides: 'Digits on the slides',
  carriage: 'Position of the carriage',
  times: 'Turns before the next reading',
  clear: 'Both, r for the result, c for the counter',
  note: 'Note',
};

/** The newest row in one line: what it came to. */
export function verdictWords(row: LadderRow | undefined): {
  readonly head: string;
  readonly rest: string;
  readonly wrong: boolean;
} {
  if (!row) return { head: 'Nothing logged yet.', rest: '', wrong: false };
  const step = `Step ${row.seq}`;
  if (row.withdrawn) return { head: `${step} is taken back.`, rest: '', wrong: false };
  if (!row.judged) return { head: `${step} logged,`, rest: 'nothing read.', wrong: false };
  const wrong = row.faults > 0;
  const agrees = !wrong && row.consequences === 0;
  const sentences = readingSentences(row.judged).slice(agrees ? 1 : 0);
  return { head: `${step} ${agrees ? 'agrees.' : 'differs.'}`, rest: sentences.slice(0, 2).join(' '), wrong };
}

/** How what was typed stands with the server. */
export function savingWords(state: OutboxState): string {
  const steps = counted(state.waiting, 'step');
  switch (state.is) {
    case 'saved':
      return 'All saved';
    case 'saving':
      return `Saving ${steps}`;
    case 'trying-again':
      return state.why === 'offline'
        ? `No connection: ${steps} kept on this device`
        : `The server is busy: ${steps} kept on this device`;
    case 'stopped':
      return `Not saved: ${steps} kept on this device`;
  }
}
