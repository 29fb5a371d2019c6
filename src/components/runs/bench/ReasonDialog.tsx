import { type ReactElement, type ReactNode, useEffect, useState } from 'react';
import { Confirm } from '@/components/ui/Confirm';
import { Field } from '@/components/ui/Field';

interface Props {
  readonly open: boolean;
  readonly title: string;
  readonly deed: string;
  readonly danger?: boolean;
  /** Label of the field for the reason; none = nothing is asked. */
  readonly label?: string;
  readonly usual?: string;
  readonly children: ReactNode;
  /** Null when it is done, else why not. */
  readonly onDo: (reason: string) => Promise<string | null>;
  readonly onClose: () => void;
}

/** Asks before a deed, with its reason where one is kept, and says why it was not done. */
export function ReasonDialog(props: Props): ReactElement {
  const { open, title, deed, danger = false, label, usual = '', children, onDo, onClose } = props;
  const [reason, setReason] = useState(usual);
  const [trouble, setTrouble] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  useEffect(() => {
    if (!open) return;
    setReason(usual);
    setTrouble(null);
  }, [open, usual]);

  const confirm = async (): Promise<void> => {
    if (busy) return;
    if (label && reason.trim() === '') {
      setTrouble('Say why; it stays with the run.');
      return;
    }
    setBusy(true);
    const said = await onDo(reason.trim());
    setBusy(false);
    setTrouble(said);
    if (said === null) onClose();
  };

  return (
    <Confirm open={open} title={title} deed={deed} danger={danger} busy={busy} onConfirm={confirm} onCancel={onClose}>
      {children}
      {label && (
        <form
          onSubmit={(event) => {
            event.preventDefault();
            void confirm();
          }}
        >
          <Field
            label={label}
            required
            maxLength={500}
            value={reason}
            autoFocus
            onFocus={({ target }) => target.select()}
            onChange={({ target }) => setReason(target.value)}
          />
        </form>
      )}
      {trouble && (
        <p className="text-vermilion" role="alert">
          {trouble}
        </p>
      )}
    </Confirm>
  );
}
