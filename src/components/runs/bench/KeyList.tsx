import { type ReactElement, useEffect, useRef } from 'react';
import { Button } from '@/components/ui/Button';
import { COMMAND_NAMES, COMMANDS } from './console';

const LINE: readonly { readonly keys: readonly string[]; readonly word: string }[] = [
  { keys: ['0–9'], word: 'numerals; missing ones on the left are zeros' },
  { keys: ['~'], word: 'after a numeral: between it and the next' },
  { keys: ['?'], word: 'a window that could not be read' },
  { keys: ['Space', '/'], word: 'from the result to the counter' },
  { keys: ['Enter'], word: 'log the turn with its reading' },
  { keys: ['Esc'], word: 'back to an empty line' },
];

function Keys({ keys, word }: { keys: readonly string[]; word: string }): ReactElement {
  return (
    <div className="contents">
      <dt className="flex gap-1.5">
        {keys.map((key) => (
          <kbd key={key} className="border border-rule-firm bg-leaf px-1.5 text-sm leading-6">
            {key}
          </kbd>
        ))}
      </dt>
      <dd>{word}</dd>
    </div>
  );
}

/** Every key of the bench. */
export function KeyList({ open, onClose }: { open: boolean; onClose: () => void }): ReactElement {
  const dialog = useRef<HTMLDialogElement>(null);
  useEffect(() => {
    const element = dialog.current;
    if (open && element && !element.open) element.showModal();
    if (!open && element?.open) element.close();
  }, [open]);
  return (
    <dialog
      ref={dialog}
      aria-labelledby="bench-keys"
      onClose={onClose}
      className="m-auto w-[min(40rem,calc(100vw-2rem))] border-2 border-ink bg-paper p-6 text-ink"
    >
      <h2 id="bench-keys" className="text-lg font-bold">
        Keys of the bench
      </h2>
      <dl className="mt-4 grid grid-cols-[auto_minmax(0,1fr)] gap-x-5 gap-y-1.5">
        {LINE.map((line) => (
          <Keys key={line.word} {...line} />
        ))}
        {COMMAND_NAMES.map((name) => (
          <Keys key={name} {...COMMANDS[name]} />
        ))}
      </dl>
      <p className="mt-4 text-sm text-ink-soft">
        Outside the line, ? opens this list and any numeral goes into the line. In the ladder, N and P go from fault to
        fault.
      </p>
      <div className="mt-5 flex justify-end">
        <Button onClick={onClose}>Close</Button>
      </div>
    </dialog>
  );
}
