import { field, type Path, type Plain, plain } from './description';
import { countingWheels, drumsOf, FAULT_KINDS, type Fault, type FaultKind, RESULT_WHEEL_FAULTS } from './faults';
import type { Layout } from './layout';
import { accept, type Problem, type Result } from './result';
import { REGISTERS } from './steps';

/** Most faults in one run: more than any layout has single ones. */
export const MOST_FAULTS = 2_000;

const EITHER_WAY = [1, -1] as const;

/** Whether any fault acts only sometimes, so that a run needs a seed. */
export function needsSeed(faults: readonly Fault[]): boolean {
  return faults.some(({ rate }) => rate !== undefined && rate < 1);
}

/** Reads the places of one fault; every place outside the layout is a problem. */
class Places {
  constructor(
    private readonly layout: Layout,
    private readonly fault: Plain,
    private readonly path: Path,
    private readonly problems: Problem[],
  ) {}

  place(name: string, least: number, most: number): number {
    return field.count(this.fault, name, least, most, 'not-in-layout', this.path, this.problems) ?? least;
  }

  by(): 1 | -1 {
    return field.oneOf(this.fault, 'by', EITHER_WAY, this.path, this.problems) ?? 1;
  }

  digit(): number {
    return field.count(this.fault, 'at', 0, 9, 'out-of-range', this.path, this.problems) ?? 0;
  }

  tooth(): number {
    return field.count(this.fault, 'tooth', 1, 9, 'out-of-range', this.path, this.problems) ?? 1;
  }

  drum(): 'add' | 'subtract' {
    const drum = field.oneOf(this.fault, 'drum', ['add', 'subtract'], this.path, this.problems) ?? 'add';
    const drums = drumsOf(this.layout);
    if (!drums.includes(drum)) this.absent('drum', drums.join(', '), drum);
    return drum;
  }

  cleared(): { register: 'result' | 'counter'; wheel: number } {
    const register = field.oneOf(this.fault, 'register', REGISTERS, this.path, this.problems) ?? 'result';
    const most = register === 'result' ? this.layout.resultWheels : this.layout.counterWheels;
    return { register, wheel: this.place('wheel', 1, most) };
  }

  carriage(): { position: number; by: 1 | -1 } {
    const most = this.layout.carriagePositions;
    const place = { position: this.place('position', 1, most), by: this.by() };
    const neighbour = place.position + place.by;
    if (neighbour < 1 || neighbour > most) this.absent('by', `a position from 1 to ${most}`, `${neighbour}`);
    return place;
  }

  private absent(name: string, expected: string, found: string): void {
    this.problems.push({
      code: 'not-in-layout',
      path: [...this.path, name],
      expected,
      found,
    });
  }
}

function faultAt(kind: FaultKind, layout: Layout, places: Places): Fault {
  switch (kind) {
    case 'carry-missed':
    case 'carry-held':
    case 'wheel-short':
    case 'wheel-over':
    case 'wheel-seized':
      return {
        kind,
        wheel: places.place('wheel', RESULT_WHEEL_FAULTS[kind], layout.resultWheels),
      };
    case 'slide-off':
      return {
        kind,
        slide: places.place('slide', 1, layout.settingSlides),
        by: places.by(),
      };
    case 'slide-stuck':
      return {
        kind,
        slide: places.place('slide', 1, layout.settingSlides),
        at: places.digit(),
      };
    case 'tooth-short':
      return { kind, tooth: places.tooth(), drum: places.drum() };
    case 'clear-missed':
      return { kind, ...places.cleared() };
    case 'counter-missed':
      return { kind, wheel: places.place('wheel', 1, countingWheels(layout)) };
    case 'counter-carry-missed':
      return { kind, wheel: places.place('wheel', 2, layout.counterWheels) };
    case 'reverse-dead':
    case 'counter-inverted':
      return { kind };
    case 'carriage-off':
      return { kind, ...places.carriage() };
  }
}

function rateOf(fault: Plain, path: Path, problems: Problem[]): { rate?: number } {
  const rate = fault.rate;
  if (rate === undefined) return {};
  if (typeof rate === 'number' && rate >= 0 && rate <= 1) return { rate };
  problems.push({
    code: 'out-of-range',
    path: [...path, 'rate'],
    expected: '0 to 1',
    found: `${typeof rate === 'number' ? rate : typeof rate}`,
  });
  return {};
}

/**
 * The door for faults: each of a known kind, at a place that the layout has, with a rate from 0 to 1. Problems
 * point at their field, such as `['faults', 0, 'wheel']`.
 */
export function acceptFaults(layout: Layout, faults: unknown, at: Path = ['faults']): Result<Fault[]> {
  if (!Array.isArray(faults))
    return {
      ok: false,
      problems: [{ code: 'missing', path: at, expected: 'a list' }],
    };
  if (faults.length > MOST_FAULTS)
    return {
      ok: false,
      problems: [
        {
          code: 'too-many',
          path: at,
          expected: `${MOST_FAULTS}`,
          found: `${faults.length}`,
        },
      ],
    };
  const problems: Problem[] = [];
  const accepted: Fault[] = [];
  faults.forEach((found: unknown, index) => {
    const path = [...at, index];
    const fault = plain(found, path, problems);
    const kind = fault && field.oneOf(fault, 'kind', FAULT_KINDS, path, problems);
    if (!fault || !kind) return;
    const rate = rateOf(fault, path, problems);
    accepted.push({
      ...faultAt(kind, layout, new Places(layout, fault, path, problems)),
      ...rate,
    });
  });
  return problems.length > 0 ? { ok: false, problems } : accept(accepted);
}
