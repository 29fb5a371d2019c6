import type { Step } from '@/lib/mechanism/steps';
import type { RunEntry } from '@/lib/schemas/run-shapes';

/** A step of a run as its page works with it. */
export type Kept = Omit<RunEntry, 'by' | 'id'> & { readonly id: string | null };

/** Steps whose ids go along: enough to recognise what an earlier page sent without hearing the answer. */
const WITH_IDS = 500;

/** Operation, reading, moment, reading's id; then what most steps do not have. */
type Packed = [
  seq: number,
  operation: string,
  result: string | 0,
  counter: string | 0,
  instant: number | 0,
  offset: number,
  readingId: string | 0,
  id?: string | 0,
  note?: string,
  corrections?: RunEntry['corrections'],
  withdrawn?: RunEntry['withdrawn'],
];

function packOperation(step: Step): string {
  switch (step.do) {
    case 'set':
      return `s${step.slides}`;
    case 'turn':
      return `${step.way === 'add' ? '+' : '-'}${step.times ?? 1}`;
    case 'shift':
      return `p${step.to}`;
    case 'reverse':
      return step.on ? 'r1' : 'r0';
    case 'clear':
      return `c${step.what}`;
  }
}

function unpackOperation(text: string): Step {
  const rest = text.slice(1);
  switch (text.charAt(0)) {
    case 's':
      return { do: 'set', slides: rest };
    case '+':
      return { do: 'turn', way: 'add', times: Number(rest) };
    case '-':
      return { do: 'turn', way: 'subtract', times: Number(rest) };
    case 'p':
      return { do: 'shift', to: Number(rest) };
    case 'r':
      return { do: 'reverse', on: rest === '1' };
    default:
      return {
        do: 'clear',
        what: rest === 'result' || rest === 'counter' ? rest : 'both',
      };
  }
}

function packOne(entry: RunEntry, withId: boolean): Packed {
  const { step, at, corrections, withdrawn } = entry;
  const packed: Packed = [
    entry.seq,
    packOperation(step),
    step.read?.result ?? 0,
    step.read?.counter ?? 0,
    at ? Date.parse(at.instant) : 0,
    at?.offsetMinutes ?? -9999,
    entry.readingId ?? 0,
  ];
  const rare = entry.note !== '' || corrections.length > 0 || withdrawn !== null;
  if (withId || rare) packed.push(withId ? entry.id : 0);
  if (rare) packed.push(entry.note, corrections, withdrawn);
  return packed;
}

function readOf(result: string | 0, counter: string | 0): Step['read'] {
  if (result === 0 && counter === 0) return undefined;
  return { ...(result !== 0 && { result }), ...(counter !== 0 && { counter }) };
}

function unpackOne(packed: Packed): Kept {
  const [seq, operation, result, counter, instant, offset, readingId] = packed;
  const [id = 0, note = '', corrections = [], withdrawn = null] = packed.slice(7) as [
    (string | 0)?,
    string?,
    RunEntry['corrections']?,
    RunEntry['withdrawn']?,
  ];
  const read = readOf(result, counter);
  return {
    seq,
    id: id === 0 ? null : id,
    step: { ...unpackOperation(operation), ...(read && { read }) },
    at: offset === -9999 ? null : { instant: new Date(instant).toISOString(), offsetMinutes: offset },
    note,
    readingId: readingId === 0 ? null : readingId,
    corrections,
    withdrawn,
  };
}

/**
 * A run's steps for its page, as one text: what an island is given stands in the page with every quotation mark
 * written out, so that ten thousand steps as objects would be several megabytes.
 */
export function packEntries(entries: readonly RunEntry[]): string {
  return JSON.stringify(entries.map((entry, index) => packOne(entry, index >= entries.length - WITH_IDS)));
}

export function unpackEntries(text: string): Kept[] {
  return (JSON.parse(text) as Packed[]).map(unpackOne);
}

/** A step as the server answered with it. */
export function keptOf({ by: _, ...entry }: RunEntry): Kept {
  return entry;
}
