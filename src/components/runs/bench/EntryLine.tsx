import { type ChangeEvent, type KeyboardEvent, type ReactElement, type RefObject, useId } from 'react';
import { Button } from '@/components/ui/Button';
import type { Layout } from '@/lib/mechanism/layout';
import type { Entry } from './console';
import { windowsOf } from './reading';
import { TypedWindows } from './TypedWindows';
import { Windows } from './Windows';
import { LINE_LABELS, nextWords } from './words';

interface Props {
  readonly entry: Entry;
  readonly layout: Layout;
  readonly input: RefObject<HTMLInputElement | null>;
  readonly onType: (text: string, pasted: boolean) => void;
  readonly onEnter: () => void;
  readonly onLeave: () => void;
  readonly onKeys: () => void;
}

function pastedIn(event: ChangeEvent<HTMLInputElement>): boolean {
  const { nativeEvent } = event;
  return (
    nativeEvent instanceof InputEvent &&
    nativeEvent.inputType !== 'insertText' &&
    nativeEvent.inputType.startsWith('insertFrom')
  );
}

/** Signs that a number pad or a telephone's keyboard does not have. */
const SIGNS = [
  { sign: '~', word: 'stands between two numerals' },
  { sign: '?', word: 'could not be read' },
  { sign: '/', word: 'from the result to the counter' },
] as const;

function Understood({ entry, layout }: { entry: Entry; layout: Layout }): ReactElement | null {
  if (entry.asking === 'reading') return <TypedWindows text={entry.text} layout={layout} />;
  if (entry.asking !== 'slides') return null;
  const blank = windowsOf('', layout.settingSlides) ?? [];
  return <Windows name="Slides" windows={windowsOf(entry.text.trim(), layout.settingSlides) ?? blank} />;
}

/** The line that everything is typed into, under what is done next. */
export function EntryLine(props: Props): ReactElement {
  const { entry, layout, input, onType, onEnter, onLeave, onKeys } = props;
  const id = useId();
  const reading = entry.asking === 'reading';
  const onKeyDown = (event: KeyboardEvent): void => {
    if (event.key === 'Escape') onLeave();
    else if (event.key === 'F1') onKeys();
    else return;
    event.preventDefault();
  };
  return (
    <form
      className="grid min-w-0 gap-2"
      onSubmit={(event) => {
        event.preventDefault();
        onEnter();
      }}
    >
      <p className="text-2xl leading-tight font-bold sm:text-4xl" data-next="">
        {nextWords(entry)}
      </p>
      {entry.note !== '' && entry.asking !== 'note' && <p className="text-sm">With the note: {entry.note}</p>}
      <label htmlFor={id} className="sr-only">
        {LINE_LABELS[entry.asking]}
      </label>
      <div className="flex flex-wrap gap-2">
        <input
          id={id}
          ref={input}
          value={entry.text}
          onChange={(event) => onType(event.target.value, pastedIn(event))}
          onKeyDown={onKeyDown}
          inputMode={entry.asking === 'note' || entry.asking === 'clear' ? 'text' : 'numeric'}
          enterKeyHint="enter"
          autoComplete="off"
          autoCorrect="off"
          autoCapitalize="off"
          spellCheck={false}
          maxLength={entry.asking === 'note' ? 500 : 200}
          placeholder={reading ? 'reading' : LINE_LABELS[entry.asking]}
          aria-invalid={entry.wrong || undefined}
          aria-describedby={`${id}-said`}
          className="h-14 w-0 min-w-28 flex-1 border-2 border-ink bg-leaf px-3 text-2xl placeholder:text-base placeholder:text-ink-soft aria-invalid:border-vermilion"
        />
        {reading &&
          SIGNS.filter(({ sign }) => sign !== '/' || layout.counterWheels > 0).map(({ sign, word }) => (
            <Button
              key={sign}
              variant="quiet"
              className={`min-w-11 px-2! text-xl ${sign === '/' ? 'max-sm:hidden' : ''}`}
              aria-label={`${sign}: ${word}`}
              onClick={() => onType(entry.text + sign, true)}
            >
              {sign}
            </Button>
          ))}
        <Button type="submit" className="sm:min-w-24">
          Enter
        </Button>
      </div>
      <p
        id={`${id}-said`}
        className={`text-sm md:min-h-6 ${entry.wrong ? 'text-vermilion' : 'text-ink-soft'}`}
        role={entry.wrong ? 'alert' : undefined}
      >
        {entry.said}
      </p>
      <div className="overflow-x-auto">
        <Understood entry={entry} layout={layout} />
      </div>
    </form>
  );
}
