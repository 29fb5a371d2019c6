import { v5 } from 'uuid';
import type { Layout } from '@/lib/mechanism/layout';
import { createMachine } from '@/lib/mechanism/machine';
import { readGlyphs, writeGlyphs } from '@/lib/mechanism/registers';
import type { Reading, Step } from '@/lib/mechanism/steps';
import type { DemoRun } from './runs';

/** Namespace of the demo's step ids, so that a run made twice is the same run. */
const NAMESPACE = '5f0c2d0e-97a2-4b2e-9c0b-6a1f6d1f9a10';
/** Seconds between two readings of a practised tester. */
const PACE = 14;

export interface PerformedStep {
  readonly id: string;
  readonly step: Step;
  readonly note: string;
  readonly at: { readonly instant: string; readonly offsetMinutes: number };
}

/** A run as the invented tester logged it, and the readings that were put right afterwards. */
export interface PerformedRun {
  readonly steps: readonly PerformedStep[];
  readonly corrections: readonly { readonly seq: number; readonly reading: Reading; readonly reason: string }[];
}

/** What the tester wrote down: what stood there, but for the slips. */
function written(shown: string, slips: NonNullable<DemoRun['slips']>): string {
  const read = readGlyphs(shown, shown.length);
  if (!read.ok) throw new Error(`A machine shows digits only, not ${shown}.`);
  const glyphs = [...read.value.glyphs];
  for (const { wheel, glyph } of slips) glyphs[wheel - 1] = glyph;
  return writeGlyphs(glyphs);
}

/** Turns the crank of the invented machine, faults and all, and writes down what its windows show. */
export function perform(run: DemoRun, layout: Layout): PerformedRun {
  const machine = createMachine(layout, { faults: run.faults, seed: run.seed });
  const began = Date.parse(run.startedAt);
  const steps: PerformedStep[] = [];
  const corrections: { seq: number; reading: Reading; reason: string }[] = [];
  run.beats.forEach((beat, index) => {
    const note = run.notes?.find((one) => one.beat === index)?.text ?? '';
    const slips = run.slips?.filter((one) => one.beat === index) ?? [];
    beat.forEach((operation, place) => {
      const { result, counter } = machine.apply(operation);
      const isLast = place === beat.length - 1;
      const seq = steps.length + 1;
      const read = isLast ? { read: { result: written(result, slips), counter } } : {};
      if (isLast && run.correction?.beat === index)
        corrections.push({ seq, reading: { result, counter }, reason: run.correction.reason });
      const seconds = index * PACE + Math.round((place / beat.length) * PACE);
      steps.push({
        id: v5(`${run.machine} ${run.title} ${run.startedAt} ${seq}`, NAMESPACE),
        step: { ...operation, ...read },
        note: isLast ? note : '',
        at: { instant: new Date(began + seconds * 1000).toISOString(), offsetMinutes: 60 },
      });
    });
  });
  return { steps, corrections };
}
