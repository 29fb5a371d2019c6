import { type ComponentProps, type ReactElement, type ReactNode, useId } from 'react';
import { FIELD } from './look';

interface Frame {
  readonly label: ReactNode;
  readonly hint?: ReactNode;
  readonly error?: string | null | undefined;
}

/** Label, hint and error around a control, tied to it by ids. */
function FieldFrame(
  props: Frame & {
    id: string;
    required: boolean;
    className: string;
    children: ReactNode;
  },
) {
  const { id, label, hint, error, required, className, children } = props;
  return (
    <div className={`${FIELD.wrap} ${className}`}>
      <label htmlFor={id} className={FIELD.label}>
        {label}
        {!required && <span className={FIELD.optional}> (optional)</span>}
      </label>
      {hint && (
        <p id={`${id}-hint`} className={FIELD.hint}>
          {hint}
        </p>
      )}
      {children}
      {error && (
        <p id={`${id}-error`} className={FIELD.error}>
          <svg className={FIELD.errorMark} viewBox="0 0 10 10" aria-hidden="true">
            <path d="M1 1 9 9M9 1 1 9" stroke="currentColor" strokeWidth="2" />
          </svg>
          <span>{error}</span>
        </p>
      )}
    </div>
  );
}

function describe(id: string, hint: ReactNode, error: string | null | undefined): string | undefined {
  return [hint && `${id}-hint`, error && `${id}-error`].filter(Boolean).join(' ') || undefined;
}

/** A labelled input; every attribute that is not its own goes to the input. */
export function Field({ label, hint, error, className = '', ...rest }: Frame & ComponentProps<'input'>): ReactElement {
  const made = useId();
  const id = rest.id ?? made;
  const frame = {
    id,
    label,
    hint,
    error,
    className,
    required: Boolean(rest.required),
  };
  return (
    <FieldFrame {...frame}>
      <input
        type="text"
        {...rest}
        id={id}
        className={FIELD.control}
        aria-invalid={error ? true : undefined}
        aria-describedby={describe(id, hint, error)}
      />
    </FieldFrame>
  );
}

type SelectProps = Frame &
  ComponentProps<'select'> & {
    readonly options: readonly {
      readonly value: string;
      readonly label: string;
    }[];
  };

/** A labelled choice from a list. */
export function SelectField({ label, hint, error, options, className = '', ...rest }: SelectProps): ReactElement {
  const made = useId();
  const id = rest.id ?? made;
  const frame = {
    id,
    label,
    hint,
    error,
    className,
    required: Boolean(rest.required),
  };
  return (
    <FieldFrame {...frame}>
      <select
        {...rest}
        id={id}
        className={`${FIELD.control} ${FIELD.select}`}
        aria-invalid={error ? true : undefined}
        aria-describedby={describe(id, hint, error)}
      >
        {options.map((option) => (
          <option key={option.value} value={option.value}>
            {option.label}
          </option>
        ))}
      </select>
    </FieldFrame>
  );
}
