import { describe, expect, it } from 'vitest';
import cases from '../../../fixtures/golden/simulate.json' with { type: 'json' };
import { acceptRun } from './accept';
import { acceptLayout, type LayoutDescription } from './layout';
import { simulate } from './machine';

/** Runs worked out by another program from the mechanism's definition; see fixtures/README.md. */
describe('golden runs', () => {
  it('are all there', () => {
    expect(cases).toHaveLength(134);
  });

  it.each(cases.map(({ body, states }, index) => ({ index, body, states })))('run $index', ({ body, states }) => {
    const layout = acceptLayout(body.layout as LayoutDescription);
    if (!layout.ok) throw new Error(JSON.stringify(layout.problems));
    const run = acceptRun(layout.value, body);
    if (!run.ok) throw new Error(JSON.stringify(run.problems));
    expect(simulate(run.value)).toEqual(states);
  });
});
