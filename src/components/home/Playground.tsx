import { type KeyboardEvent, type ReactElement, useState } from 'react';
import { Ladder } from '@/components/ladder/Ladder';
import { readingSentences } from '@/components/ladder/words';
import { LayoutDrawing } from '@/components/mechanism/LayoutDrawing';
import { Button } from '@/components/ui/Button';
import { FaultChooser } from './FaultChooser';
import { createPlayground, PLAY_LAYOUT, type Playground as Play, type PlayState } from './playground';
import { SlideStepper } from './SlideStepper';

const SLIDES = Array.from({ length: PLAY_LAYOUT.settingSlides }, (_, index) => PLAY_LAYOUT.settingSlides - index);

/** Whether a key pressed in an element is meant for that element and not for the crank. */
function takesKeys(target: EventTarget): boolean {
  return target instanceof Element && target.closest('select, input, textarea') !== null;
}

type Deed = (play: Play) => PlayState;

function Slides({ state, onDo }: { state: PlayState; onDo: (deed: Deed) => void }): ReactElement {
  return (
    <fieldset>
      <legend className="mb-1.5 text-sm font-bold">Setting slides</legend>
      <div className="flex">
        {SLIDES.map((slide) => (
          <SlideStepper
            key={slide}
            slide={slide}
            digit={Number(state.slides.charAt(state.slides.length - slide))}
            onSet={(digit) => onDo((play) => play.setSlide(slide, digit))}
          />
        ))}
      </div>
    </fieldset>
  );
}

function Crank({ state, onDo }: { state: PlayState; onDo: (deed: Deed) => void }): ReactElement {
  const { carriage } = state;
  const square = 'w-12 px-0';
  return (
    <div className="grid flex-1 content-start gap-3">
      <fieldset>
        <legend className="mb-1.5 text-sm font-bold">Crank</legend>
        <div className="grid grid-cols-2 gap-2">
          <Button className="px-2" onClick={() => onDo((play) => play.turn('add'))}>
            Add +
          </Button>
          <Button variant="quiet" className="px-2" onClick={() => onDo((play) => play.turn('subtract'))}>
            Take −
          </Button>
        </div>
      </fieldset>
      <fieldset>
        <legend className="mb-1.5 text-sm font-bold">Carriage</legend>
        <div className="grid grid-cols-[3rem_minmax(0,1fr)_3rem] items-center gap-2 text-center">
          <Button
            variant="quiet"
            className={square}
            disabled={carriage === 1}
            aria-label="Carriage one place left"
            onClick={() => onDo((play) => play.shift(carriage - 1))}
          >
            <svg className="size-3" viewBox="0 0 10 10" aria-hidden="true">
              <path d="M7 1L3 5l4 4" fill="none" stroke="currentColor" strokeWidth="1.75" />
            </svg>
          </Button>
          <output>
            <span className="sr-only">Carriage at </span>
            {carriage} of {PLAY_LAYOUT.carriagePositions}
          </output>
          <Button
            variant="quiet"
            className={square}
            disabled={carriage === PLAY_LAYOUT.carriagePositions}
            aria-label="Carriage one place right"
            onClick={() => onDo((play) => play.shift(carriage + 1))}
          >
            <svg className="size-3" viewBox="0 0 10 10" aria-hidden="true">
              <path d="M3 1l4 4-4 4" fill="none" stroke="currentColor" strokeWidth="1.75" />
            </svg>
          </Button>
        </div>
      </fieldset>
    </div>
  );
}

/** What the last row came to, beside the crank, so that it is seen without looking away. */
function LastWords({ state }: { state: PlayState }): ReactElement {
  const row = state.rows.at(-1);
  const wrong = (row?.faults ?? 0) > 0;
  return (
    <p
      className={`min-h-12 border-l-4 pl-3 text-sm ${wrong ? 'border-vermilion' : 'border-verdigris'}`}
      aria-hidden="true"
    >
      {row?.judged ? (
        <>
          <span className={wrong ? 'font-bold text-vermilion' : 'font-bold text-verdigris'}>
            Step {row.seq} {wrong ? 'differs. ' : 'agrees. '}
          </span>
          {wrong && readingSentences(row.judged)[0]}
        </>
      ) : (
        'Set the slides, then turn the crank.'
      )}
    </p>
  );
}

/**
 * A machine to play with: real core, real fault, real ladder, no server. The first rows are drawn on the server, so
 * that the page says what it is about before any script has come.
 */
export function Playground(): ReactElement {
  const [play] = useState(createPlayground);
  const [state, setState] = useState(play.state);
  const onDo = (deed: Deed): void => setState(deed(play));
  const onKeyDown = (event: KeyboardEvent): void => {
    if (event.ctrlKey || event.metaKey || event.altKey || takesKeys(event.target)) return;
    if (event.key !== '+' && event.key !== '-') return;
    event.preventDefault();
    onDo((machine) => machine.turn(event.key === '+' ? 'add' : 'subtract'));
  };
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: plus and minus turn the crank from anywhere in here; the buttons do the same.
    <div className="grid gap-x-10 gap-y-8 lg:grid-cols-[28rem_minmax(0,1fr)]" onKeyDown={onKeyDown}>
      <section
        aria-label="The machine"
        className="grid content-start gap-5 md:max-lg:grid-cols-2 md:max-lg:*:not-first:not-nth-2:col-span-2"
      >
        <LayoutDrawing
          layout={PLAY_LAYOUT}
          position={state.carriage}
          shown={{ result: state.result, counter: state.counter, slides: state.slides }}
          title="The machine as it stands"
        />
        <div className="flex flex-wrap gap-x-6 gap-y-3">
          <Slides state={state} onDo={onDo} />
          <Crank state={state} onDo={onDo} />
        </div>
        <LastWords state={state} />
        <FaultChooser
          layout={PLAY_LAYOUT}
          fault={state.fault}
          onGive={(fault) => onDo((machine) => machine.give(fault))}
        />
        <div className="flex flex-wrap items-center gap-2">
          <Button variant="quiet" onClick={() => onDo((machine) => machine.clear())}>
            Clear wheels
          </Button>
          <Button variant="quiet" onClick={() => onDo((machine) => machine.restart())}>
            New ladder
          </Button>
          <p className="text-sm text-ink-soft">
            <kbd className="border border-rule-firm px-1.5 text-xs">+</kbd> and{' '}
            <kbd className="border border-rule-firm px-1.5 text-xs">-</kbd> turn the crank
          </p>
        </div>
      </section>
      <section aria-label="What the windows show" className="min-w-0">
        <Ladder layout={PLAY_LAYOUT} rows={state.rows} live room="short" legend="open" label="Ladder of this machine" />
      </section>
    </div>
  );
}
