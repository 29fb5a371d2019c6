import type { ReactElement } from 'react';
import { betweenOf } from '@/components/ladder/words';
import type { WindowShown } from './reading';

const CELL =
  'grid h-9 w-[1.35rem] place-items-center border-y border-r border-rule-firm text-lg first:border-l sm:w-7 sm:text-xl';

function Glyph({ shown }: { shown: WindowShown }): ReactElement {
  const { glyph, typed } = shown;
  if (glyph === '?') return <span className="hatched h-6 w-4" />;
  if (glyph.length > 1) {
    const [lower, upper] = betweenOf(glyph);
    return (
      <span className="grid text-[0.7rem] leading-[1.05] font-bold">
        <span>{lower}</span>
        <span className="border-t border-ink">{upper}</span>
      </span>
    );
  }
  return <span className={typed ? 'font-bold' : 'text-ink-soft'}>{glyph}</span>;
}

/**
 * Windows as they will be taken: what was typed in bold at the right, zeros that are filled in on the left pale, so that
 * nobody is surprised by them. A drawing; the same is said in words beside the line.
 */
export function Windows({ name, windows }: { name: string; windows: readonly WindowShown[] }): ReactElement {
  return (
    <div className="grid gap-0.5" aria-hidden="true">
      <span className="text-xs text-ink-soft">{name}</span>
      <span className="flex">
        {windows.map((shown) => (
          <span
            key={shown.wheel}
            className={`${CELL} ${shown.wheel % 3 === 1 && shown.wheel > 1 ? 'border-r-2 border-r-ink-soft' : ''}`}
          >
            <Glyph shown={shown} />
          </span>
        ))}
      </span>
    </div>
  );
}
