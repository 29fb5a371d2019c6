import { benchCore } from '@tests/bench/core.bench';
import { benchPages } from '@tests/bench/pages.bench';

interface Figure {
  readonly name: string;
  readonly value: number;
  readonly unit: string;
  readonly atLeast?: number | undefined;
  readonly atMost?: number | undefined;
}

const isKept = ({ value, atLeast = Number.NEGATIVE_INFINITY, atMost = Number.POSITIVE_INFINITY }: Figure): boolean =>
  value >= atLeast && value <= atMost;

function line(figure: Figure, width: number): string {
  const { name, value, unit, atLeast, atMost } = figure;
  const shown = `${Number(value.toPrecision(4))} ${unit}`.trim();
  const limit = atLeast !== undefined ? `at least ${atLeast}` : atMost !== undefined ? `at most ${atMost}` : '';
  const verdict = limit === '' ? '' : isKept(figure) ? 'kept' : 'BROKEN';
  return `${name.padEnd(width)}  ${shown.padStart(16)}  ${limit.padEnd(14)}  ${verdict}`.trimEnd();
}

const figures: Figure[] = [...(await benchPages()), ...(await benchCore())];
const width = Math.max(...figures.map(({ name }) => name.length));
for (const figure of figures) console.log(line(figure, width));
const broken = figures.filter((figure) => !isKept(figure));
console.log(`\n${figures.length} figures, ${broken.length} over a limit`);
process.exit(broken.length === 0 ? 0 : 1);
