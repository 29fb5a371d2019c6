import { type ReactElement, useEffect, useState } from 'react';
import type { LadderRow } from '@/components/ladder/rows';
import { operationSentence } from '@/components/ladder/words';
import { Confirm } from '@/components/ui/Confirm';
import { Field } from '@/components/ui/Field';
import type { Layout } from '@/lib/mechanism/layout';
import type { Reading } from '@/lib/mechanism/steps';
import { acceptStep, readingOf, takeApart } from './reading';
import { TypedWindows } from './TypedWindows';

interface Props {
  readonly open: boolean;
  readonly layout: Layout;
  readonly row: LadderRow | null;
  readonly onCorrect: (seq: number, reading: Reading, reason: string) => Promise<string | null>;
  readonly onClose: () => void;
}

const glyphs = (wheels: readonly { readonly read: string }[]): string =>
  wheels.every(({ read }) => read === '?')
    ? ''
    : [...wheels]
        .reverse()
        .map(({ read }) => read)
        .join('');

/** A row's reading as it would be typed. */
function typedOf(row: LadderRow | null): string {
  if (!row?.judged) return '';
  const [result, counter] = [glyphs(row.judged.result), glyphs(row.judged.counter)];
  return counter === '' ? result : `${result}/${counter}`;
}

/** The reading that was typed, as the core takes it, or what is wrong with it. */
function understood(text: string, layout: Layout, row: LadderRow): Reading | string {
  const typed = takeApart(text, layout);
  if (typeof typed === 'string') return typed;
  const read = readingOf(typed);
  if (!read) return 'Type what stood in the windows; ? stands for one that could not be read.';
  const step = acceptStep(layout, row.operation, read);
  return typeof step === 'string' ? step : (step.read ?? read);
}

/** Puts a reading right, or adds one where none was. What stood there before stays on record. */
export function CorrectDialog({ open, layout, row, onCorrect, onClose }: Props): ReactElement {
  const [text, setText] = useState('');
  const [reason, setReason] = useState('');
  const [trouble, setTrouble] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  useEffect(() => {
    if (!open) return;
    setText(typedOf(row));
    setReason('');
    setTrouble(null);
  }, [open, row]);

  const confirm = async (): Promise<void> => {
    if (!row || busy) return;
    const reading = understood(text, layout, row);
    if (typeof reading === 'string') return setTrouble(reading);
    if (row.judged && reason.trim() === '')
      return setTrouble('Say why the reading is replaced; it stays with the run.');
    setBusy(true);
    const said = await onCorrect(row.seq, reading, reason.trim());
    setBusy(false);
    setTrouble(said);
    if (said === null) onClose();
  };
  const title = row ? `${row.judged ? 'Correct' : 'Add'} the reading of step ${row.seq}` : '';
  const deed = row?.judged ? 'Correct reading' : 'Add reading';

  return (
    <Confirm open={open && row !== null} title={title} deed={deed} busy={busy} onConfirm={confirm} onCancel={onClose}>
      <form
        className="grid gap-4"
        onSubmit={(event) => {
          event.preventDefault();
          void confirm();
        }}
      >
        <p className="first-letter:uppercase">
          {row ? `${operationSentence(row.operation)}. ` : ''}
          {row?.judged ? 'The earlier reading stays on record.' : 'Nothing was read here yet.'}
        </p>
        <Field
          label="What stood in the windows"
          hint={layout.counterWheels > 0 ? 'Result, then / and the counter.' : undefined}
          required
          autoFocus
          autoComplete="off"
          spellCheck={false}
          value={text}
          onChange={({ target }) => setText(target.value)}
        />
        <div className="overflow-x-auto">
          <TypedWindows text={text} layout={layout} />
        </div>
        {row?.judged && (
          <Field
            label="Why"
            required
            maxLength={500}
            value={reason}
            placeholder="Misread, mistyped"
            onChange={({ target }) => setReason(target.value)}
          />
        )}
        <button type="submit" className="sr-only" tabIndex={-1}>
          {deed}
        </button>
      </form>
      {trouble && (
        <p className="text-vermilion" role="alert">
          {trouble}
        </p>
      )}
    </Confirm>
  );
}
