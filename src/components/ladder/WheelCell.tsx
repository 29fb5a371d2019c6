import type { ReactElement } from 'react';
import type { LadderWheel } from '@/lib/comparison/compare';
import type { Register } from '@/lib/mechanism/steps';
import { betweenOf, carryMark, cellWords } from './words';

/** The numeral as it stands in the window: whole, cut between two, or hidden behind hatching. */
function Glyph({ read }: { read: string }): ReactElement {
  if (read === '?') return <span className="glyph" aria-hidden="true" />;
  if (read.length === 1)
    return (
      <span className="glyph" aria-hidden="true">
        {read}
      </span>
    );
  const [leaving, coming] = betweenOf(read);
  return (
    <span className="glyph" aria-hidden="true">
      <span className="glyph-half leaving">{leaving}</span>
      <span className="glyph-half coming">{coming}</span>
    </span>
  );
}

interface Props {
  readonly register: Register;
  readonly wheel: LadderWheel;
  /** Whether a thin rule sets it off from the three wheels above. */
  readonly third: boolean;
}

/**
 * One wheel of one reading. The usual cell, a numeral that agrees with no carry, is a bare table cell: a page of
 * the ladder has hundreds of them. Every other one says in words what its marks say.
 */
export function WheelCell({ register, wheel, third }: Props): ReactElement {
  const carry = carryMark(wheel);
  const verdict = wheel.follows && wheel.verdict === 'differs' ? 'follows' : wheel.verdict;
  const thirdMark = third ? '' : undefined;
  if (verdict === 'agrees' && !carry)
    return (
      <td className="wheel" data-third={thirdMark}>
        {wheel.read}
      </td>
    );
  const wrong = wheel.verdict === 'differs' || wheel.verdict === 'between';
  const wanted = wrong ? wheel.expectedFromLast : null;
  return (
    <td
      className="wheel"
      data-third={thirdMark}
      data-verdict={verdict}
      data-carry={carry ?? undefined}
      data-cut={wheel.read.length > 1 ? '' : undefined}
      data-wanted={wanted === null ? undefined : ''}
    >
      {wanted !== null && (
        <span className="wanted" aria-hidden="true">
          {wanted}
        </span>
      )}
      <Glyph read={wheel.read} />
      <span className="sr-only">{cellWords(register, wheel)}</span>
    </td>
  );
}
