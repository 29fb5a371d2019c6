import { type ReactElement, type ReactNode, useEffect, useId, useRef } from 'react';
import { Button } from './Button';

interface Props {
  readonly open: boolean;
  readonly title: string;
  /** What will happen, and whether it can be taken back. */
  readonly children: ReactNode;
  /** The deed in words: "Delete run", never "OK". */
  readonly deed: string;
  readonly danger?: boolean;
  readonly busy?: boolean;
  readonly onConfirm: () => void;
  readonly onCancel: () => void;
}

/**
 * Asks before something that matters. A modal <dialog>: the browser holds the focus in it, Escape cancels, and the
 * focus goes back where it was. The button that changes nothing has the focus first.
 */
export function Confirm(props: Props): ReactElement {
  const { open, title, children, deed, danger = false, busy = false, onConfirm, onCancel } = props;
  const dialog = useRef<HTMLDialogElement>(null);
  const id = useId();
  useEffect(() => {
    const element = dialog.current;
    if (open && element && !element.open) element.showModal();
    if (!open && element?.open) element.close();
  }, [open]);
  return (
    <dialog
      ref={dialog}
      aria-labelledby={`${id}-title`}
      aria-describedby={`${id}-body`}
      onCancel={(event) => {
        event.preventDefault();
        onCancel();
      }}
      className="m-auto w-[min(32rem,calc(100vw-2rem))] border-2 border-ink bg-paper p-6 text-ink"
    >
      <h2 id={`${id}-title`} className="text-lg font-bold">
        {title}
      </h2>
      <div id={`${id}-body`} className="mt-3 grid gap-2">
        {children}
      </div>
      <div className="mt-6 flex flex-wrap justify-end gap-2">
        <Button variant="quiet" onClick={onCancel}>
          Keep as it is
        </Button>
        <Button variant={danger ? 'danger' : 'main'} disabled={busy} onClick={onConfirm}>
          {deed}
        </Button>
      </div>
    </dialog>
  );
}
