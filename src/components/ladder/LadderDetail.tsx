import type { ReactElement } from 'react';
import type { JudgedReading, LadderWheel } from '@/lib/comparison/compare';
import type { Register } from '@/lib/mechanism/steps';
import type { LadderRow } from './rows';
import { operationSentence, readingSentences } from './words';

/** One register as a strip of glyphs; those that are not what was read are marked. */
function Strip(props: { wheels: readonly LadderWheel[]; glyphOf: (wheel: LadderWheel) => string }): ReactElement {
  const { wheels, glyphOf } = props;
  const top = wheels.length;
  return (
    <span className="strip">
      {wheels
        .map((wheel) => {
          const glyph = glyphOf(wheel);
          const off = wheel.read !== '?' && glyph !== '·' && glyph !== wheel.read;
          return (
            <span
              key={wheel.wheel}
              data-off={off ? '' : undefined}
              data-third={wheel.wheel % 3 === 0 && wheel.wheel !== top ? '' : undefined}
            >
              {glyph}
            </span>
          );
        })
        .reverse()}
    </span>
  );
}

const STANDINGS = [
  { name: 'Read', glyphOf: (wheel: LadderWheel) => wheel.read },
  {
    name: 'Expected from last',
    glyphOf: (wheel: LadderWheel) => (wheel.expectedFromLast === null ? '·' : String(wheel.expectedFromLast)),
  },
  { name: 'Expected from start', glyphOf: (wheel: LadderWheel) => String(wheel.expected) },
] as const;

/** What was read over both expectations, wheel under wheel. */
function Standings({ judged }: { judged: JudgedReading }): ReactElement {
  const registers = (['result', 'counter'] as const).filter((register: Register) => judged[register].length > 0);
  return (
    <div className="grid gap-x-10 gap-y-4 sm:flex sm:flex-wrap">
      {registers.map((register) => (
        <table key={register} className="text-left max-sm:block max-sm:[&>tbody]:block">
          <caption className="text-left text-sm font-bold max-sm:block">
            {register === 'result' ? 'Result register' : 'Counter'}
          </caption>
          <tbody>
            {STANDINGS.map(({ name, glyphOf }) => (
              <tr key={name} className="max-sm:flex max-sm:flex-wrap max-sm:justify-between">
                <th
                  scope="row"
                  className="pr-4 text-sm font-normal text-ink-soft max-sm:pr-2 max-sm:text-xs max-sm:leading-6"
                >
                  {name}
                </th>
                <td>
                  <Strip wheels={judged[register]} glyphOf={glyphOf} />
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      ))}
    </div>
  );
}

function readWords(row: LadderRow, at: number): string {
  const was = row.corrections[at]?.was;
  return [was?.result && `result ${was.result}`, was?.counter && `counter ${was.counter}`].filter(Boolean).join(', ');
}

/** What happened to a row after it was made, and what was remarked. */
function Remarks({ row }: { row: LadderRow }): ReactElement {
  return (
    <>
      {row.note && <p>Noted: {row.note}</p>}
      {row.corrections.map((correction, at) => (
        <p key={`${correction.when} ${correction.who}`}>
          Corrected by {correction.who}, {correction.when}: {correction.why} It said {readWords(row, at)}.
        </p>
      ))}
      {row.withdrawn && (
        <p>
          Taken back by {row.withdrawn.who}, {row.withdrawn.when}: {row.withdrawn.why}
        </p>
      )}
    </>
  );
}

/** How the machine stood at a row, as a sentence without its full stop. */
export function standingWords(row: LadderRow): string {
  const lever = row.reversed ? ', reversing lever thrown' : '';
  return `carriage at ${row.carriage}, slides ${row.slides.replace(/^0+(?=\d)/u, '')}${lever}`;
}

/** Everything one row has to say, below the ladder, in words. */
export function LadderDetail({ row }: { row: LadderRow }): ReactElement {
  return (
    <div className="grid gap-3 px-4 py-3">
      <p className="flex flex-wrap items-baseline gap-x-4">
        <strong>
          Step {row.seq}: {operationSentence(row.operation)}
        </strong>
        <span className="text-sm text-ink-soft">
          {standingWords(row)}
          {row.at && `, ${row.at}`}
        </span>
      </p>
      {row.judged ? (
        <>
          <ul className="grid gap-1">
            {readingSentences(row.judged).map((sentence) => (
              <li key={sentence}>{sentence}</li>
            ))}
          </ul>
          <Standings judged={row.judged} />
        </>
      ) : (
        <p>{row.withdrawn ? 'Not judged.' : 'Nothing was read here.'}</p>
      )}
      <Remarks row={row} />
    </div>
  );
}
