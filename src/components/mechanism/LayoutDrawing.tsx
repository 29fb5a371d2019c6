import { type ReactElement, useId } from 'react';
import type { Place } from '@/lib/comparison/compare';
import type { Layout } from '@/lib/mechanism/layout';
import type { Register } from '@/lib/mechanism/steps';
import { COLUMN, type Drawing, drawingOf, drawingWords, type Reach } from './drawing';

/** What stands on the machine, each highest first; left out, the windows show their positions instead. */
export interface Shown {
  readonly result: string;
  readonly counter: string;
  readonly slides: string;
}

interface Props {
  readonly layout: Layout;
  /** Where the carriage stands; 1 when left out. */
  readonly position?: number;
  readonly shown?: Shown;
  readonly excluded?: readonly Place[];
  readonly title?: string;
}

// Heights from the top: counter, result, then the body with slides and the rail of positions.
const Y = {
  counter: 12,
  result: 62,
  carriageEnd: 106,
  body: 126,
  slot: 140,
  slotEnd: 206,
  rail: 232,
  end: 252,
} as const;
const WINDOW = { width: COLUMN - 8, height: 30 } as const;

/** Digit `index` of a register from the right, as it is written highest first. */
function glyphAt(written: string, wheel: number): string {
  return written.charAt(written.length - wheel) || '0';
}

interface WheelProps {
  readonly x: number;
  readonly y: number;
  readonly text: string;
  readonly moved: boolean;
  readonly out: boolean;
  readonly numeral: boolean;
}

function WheelWindow({ x, y, text, moved, out, numeral }: WheelProps): ReactElement {
  return (
    <g>
      <rect
        x={x - WINDOW.width / 2}
        y={y}
        width={WINDOW.width}
        height={WINDOW.height}
        className={moved ? 'fill-verdigris-wash stroke-verdigris' : 'fill-leaf stroke-rule-firm'}
        strokeWidth={moved ? 2 : 1}
        strokeDasharray={out ? '1.5 3' : undefined}
      />
      <text
        x={x}
        y={y + WINDOW.height / 2}
        dy="0.36em"
        textAnchor="middle"
        fontSize={numeral ? 18 : 11}
        className={out ? 'fill-ink-soft' : numeral ? 'fill-ink' : 'fill-ink-soft'}
      >
        {text}
      </text>
    </g>
  );
}

interface RegisterProps {
  readonly register: Register;
  readonly count: number;
  readonly drawing: Drawing;
  readonly moved: Reach | null;
  readonly written: string | undefined;
  readonly excluded: readonly Place[];
}

function RegisterWindows({ register, count, drawing, moved, written, excluded }: RegisterProps): ReactElement[] {
  return Array.from({ length: count }, (_, index) => {
    const wheel = index + 1;
    return (
      <WheelWindow
        key={wheel}
        x={drawing.wheelX(wheel)}
        y={Y[register]}
        text={written === undefined ? String(wheel) : glyphAt(written, wheel)}
        numeral={written !== undefined}
        moved={moved !== null && wheel >= moved.from && wheel <= moved.to}
        out={excluded.some((place) => place.register === register && place.wheel === wheel)}
      />
    );
  });
}

/** A slide in its slot: 0 at the top, 9 at the bottom, the knob at its digit. */
function Slide({ x, digit, driving }: { x: number; digit: number; driving: boolean }): ReactElement {
  const step = (Y.slotEnd - Y.slot) / 9;
  const knob = Y.slot + digit * step;
  return (
    <g className="stroke-rule-firm" fill="none">
      <path
        d={Array.from({ length: 10 }, (_, at) => `M${x - 5} ${Y.slot + at * step}h10`).join('')}
        strokeWidth="0.75"
      />
      <path d={`M${x} ${Y.slot}V${Y.slotEnd}`} className="stroke-ink" strokeWidth="2" />
      {driving && (
        <path d={`M${x} ${Y.slot - 6}V${Y.result + WINDOW.height}`} className="stroke-verdigris" strokeWidth="1.5" />
      )}
      <rect x={x - 8} y={knob - 4} width="16" height="8" className="fill-ink stroke-none" />
    </g>
  );
}

/** A bracket over the wheels something reaches, with a tick at its end. */
function Bracket(props: { drawing: Drawing; reach: Reach | null; y: number; dashed?: boolean }): ReactElement | null {
  const { drawing, reach, y, dashed = false } = props;
  if (!reach) return null;
  const [right, left] = [drawing.wheelX(reach.from) + COLUMN / 2 - 3, drawing.wheelX(reach.to) - COLUMN / 2 + 3];
  return (
    <path
      d={`M${right} ${y}H${left}m0 -4v8`}
      fill="none"
      className="stroke-ink"
      strokeWidth="1.25"
      strokeDasharray={dashed ? '4 3' : undefined}
    />
  );
}

function Rail({ layout, drawing, position }: { layout: Layout; drawing: Drawing; position: number }): ReactElement {
  const places = Array.from({ length: layout.carriagePositions }, (_, index) => index + 1);
  return (
    <g>
      <path
        d={`M${drawing.positionX(1) - 8} ${Y.rail}H${drawing.positionX(layout.carriagePositions) + 8}`}
        className="stroke-ink"
        strokeWidth="1.5"
      />
      {places.map((place) => (
        <g key={place}>
          <path d={`M${drawing.positionX(place)} ${Y.rail - 4}v8`} className="stroke-ink" strokeWidth="1" />
          {place === position && (
            <path d={`M${drawing.positionX(place)} ${Y.rail - 4}l-5 -9h10z`} className="fill-verdigris" />
          )}
          <text
            x={drawing.positionX(place)}
            y={Y.rail + 17}
            textAnchor="middle"
            fontSize="11"
            fontWeight={place === position ? 700 : 400}
            className="fill-ink"
          >
            {place}
          </text>
        </g>
      ))}
    </g>
  );
}

/** What the lines of the drawing mean, as far as this layout has them. */
function Caption({ layout, drawing }: { layout: Layout; drawing: Drawing }): ReactElement {
  const parts = [
    layout.counterWheels > 0 ? 'Above the counter, below it the result register, both on the carriage.' : '',
    'Wheels are numbered from the units; framed ones move with a turn.',
    drawing.carried ? 'Unbroken line: how far a carry reaches.' : '',
    drawing.complement ? 'Broken line: the complement steps.' : '',
  ];
  return <figcaption className="mt-2 max-w-[68ch] text-sm text-ink-soft">{parts.filter(Boolean).join(' ')}</figcaption>;
}

/** Wide drawings keep their numbers readable and scroll instead, by keyboard too. */
const SCROLLING_FROM = 24;

function widthClass(columns: number): string {
  if (columns > 40) return 'min-w-[76rem]';
  return columns > SCROLLING_FROM ? 'min-w-[46rem]' : '';
}

/**
 * A machine's layout as a drawing: slides in the body, both registers on the carriage, what the slides drive at a
 * position, how far a carry reaches (unbroken bracket) and the complement steps (broken one), excluded wheels
 * dotted. With `shown` it is the machine itself, numerals in the windows. Needs no script.
 */
export function LayoutDrawing({ layout, position = 1, shown, excluded = [], title = 'Layout' }: Props): ReactElement {
  const id = useId();
  const drawing = drawingOf(layout, position);
  const carriageLeft = drawing.wheelX(Math.max(layout.resultWheels, layout.counterWheels)) - COLUMN / 2;
  const carriageRight = drawing.wheelX(1) + COLUMN / 2;
  const counting = drawing.counting === null ? null : { from: drawing.counting, to: drawing.counting };
  const drives = (slide: number): boolean => drawing.driven !== null && slide + position - 1 <= drawing.driven.to;
  return (
    <figure className="overflow-x-auto" tabIndex={drawing.columns > SCROLLING_FROM ? 0 : undefined}>
      <svg
        role="img"
        aria-labelledby={`${id}-title ${id}-words`}
        viewBox={`-4 0 ${drawing.width + 8} ${Y.end}`}
        width={(drawing.width + 8) * 1.3}
        className={`h-auto max-w-full ${widthClass(drawing.columns)}`}
      >
        <title id={`${id}-title`}>{title}</title>
        <desc id={`${id}-words`}>{drawingWords(layout, position)}</desc>
        <rect
          x={carriageLeft}
          y="1"
          width={carriageRight - carriageLeft}
          height={Y.carriageEnd}
          className="fill-paper stroke-ink"
          strokeWidth="1.5"
        />
        <rect
          x={drawing.slideX(layout.settingSlides) - COLUMN / 2}
          y={Y.body}
          width={layout.settingSlides * COLUMN}
          height={Y.slotEnd + 10 - Y.body}
          className="fill-paper stroke-ink"
          strokeWidth="1.5"
        />
        {Array.from({ length: layout.settingSlides }, (_, index) => index + 1).map((slide) => (
          <Slide
            key={slide}
            x={drawing.slideX(slide)}
            digit={shown ? Number(glyphAt(shown.slides, slide)) : 0}
            driving={drives(slide)}
          />
        ))}
        <RegisterWindows
          register="counter"
          count={layout.counterWheels}
          drawing={drawing}
          moved={counting}
          written={shown?.counter}
          excluded={excluded}
        />
        <RegisterWindows
          register="result"
          count={layout.resultWheels}
          drawing={drawing}
          moved={drawing.driven}
          written={shown?.result}
          excluded={excluded}
        />
        <Bracket drawing={drawing} reach={drawing.carried} y={52} />
        <Bracket drawing={drawing} reach={drawing.complement} y={100} dashed />
        <Rail layout={layout} drawing={drawing} position={position} />
      </svg>
      {!shown && <Caption layout={layout} drawing={drawing} />}
    </figure>
  );
}
