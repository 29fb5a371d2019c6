import type { KeyboardEvent, ReactElement } from 'react';

interface Props {
  /** 1 = lowest. */
  readonly slide: number;
  readonly digit: number;
  readonly onSet: (digit: number) => void;
}

const ARROW = 'flex min-h-11 w-full items-center justify-center hover:bg-verdigris-wash disabled:text-rule-firm';

function Arrow({ up }: { up: boolean }): ReactElement {
  return (
    <svg className="size-3" viewBox="0 0 10 10" aria-hidden="true">
      <path d={up ? 'M1 7l4-4 4 4' : 'M1 3l4 4 4-4'} fill="none" stroke="currentColor" strokeWidth="1.75" />
    </svg>
  );
}

function digitFor(key: string, digit: number): number | null {
  if (/^[0-9]$/u.test(key)) return Number(key);
  if (key === 'ArrowUp') return Math.min(9, digit + 1);
  if (key === 'ArrowDown') return Math.max(0, digit - 1);
  if (key === 'Home') return 0;
  return key === 'End' ? 9 : null;
}

/** One setting slide: buttons for a finger, and a spin button that takes digits, arrows, Home and End. */
export function SlideStepper({ slide, digit, onSet }: Props): ReactElement {
  const onKeyDown = (event: KeyboardEvent): void => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    const set = digitFor(event.key, digit);
    if (set === null) return;
    event.preventDefault();
    onSet(set);
  };
  return (
    <div className="grid w-12 border border-l-0 border-rule-firm bg-leaf first:border-l">
      <button
        type="button"
        tabIndex={-1}
        className={ARROW}
        disabled={digit === 9}
        aria-label={`Slide ${slide} one up`}
        onClick={() => onSet(digit + 1)}
      >
        <Arrow up />
      </button>
      <div
        role="spinbutton"
        tabIndex={0}
        aria-label={`Slide ${slide}`}
        aria-valuenow={digit}
        aria-valuemin={0}
        aria-valuemax={9}
        className="flex h-12 items-center justify-center border-y border-rule-firm text-2xl font-bold focus-visible:relative focus-visible:z-10"
        onKeyDown={onKeyDown}
      >
        {digit}
      </div>
      <button
        type="button"
        tabIndex={-1}
        className={ARROW}
        disabled={digit === 0}
        aria-label={`Slide ${slide} one down`}
        onClick={() => onSet(digit - 1)}
      >
        <Arrow up={false} />
      </button>
    </div>
  );
}
