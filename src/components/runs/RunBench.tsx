import { type ReactElement, useCallback, useState } from 'react';
import { Ladder } from '@/components/ladder/Ladder';
import type { LadderRow } from '@/components/ladder/rows';
import { operationSentence } from '@/components/ladder/words';
import { paths } from '@/lib/paths';
import { Controls } from './bench/Controls';
import { CorrectDialog } from './bench/CorrectDialog';
import type { Deed } from './bench/console';
import { EntryLine } from './bench/EntryLine';
import { KeyList } from './bench/KeyList';
import { ReasonDialog } from './bench/ReasonDialog';
import { SaveMark, Stopped } from './bench/SaveMark';
import { useEntry } from './bench/useEntry';
import { type LiveRun, useRun } from './bench/useRun';
import { verdictWords } from './bench/words';
import { RunActions } from './RunActions';
import type { RunProps } from './run-props';
import { summarise, summaryFaults, summaryHead } from './summary';

function Verdict({ row }: { row: LadderRow | undefined }): ReactElement {
  const { head, rest, wrong } = verdictWords(row);
  return (
    <p className={`min-h-12 border-l-4 pl-3 ${wrong ? 'border-vermilion' : 'border-verdigris'}`} data-verdict-line="">
      <span className={`font-bold ${wrong ? 'text-vermilion' : ''}`}>{head}</span> {rest}
    </p>
  );
}

interface DialogsProps {
  readonly run: LiveRun;
  readonly asked: Deed | null;
  readonly picked: LadderRow | null;
  readonly onClose: () => void;
}

function Dialogs({ run, asked, picked, onClose }: DialogsProps): ReactElement {
  const last = run.rows.findLast((row) => row.withdrawn === null);
  const summary = summarise(run.rows);
  return (
    <>
      <ReasonDialog
        open={asked === 'take-back' && last !== undefined}
        title={`Take back step ${last?.seq ?? ''}`}
        deed="Take back"
        label="Why"
        usual="Logged by mistake"
        onDo={(reason) => (last ? run.takeBack(last.seq, reason) : Promise.resolve(null))}
        onClose={onClose}
      >
        <p className="first-letter:uppercase">
          {last ? `${operationSentence(last.operation)}. ` : ''}It stays in sight, marked, and is not judged. The next
          step gets the next number.
        </p>
      </ReasonDialog>
      <CorrectDialog
        open={asked === 'correct'}
        layout={run.layout}
        row={picked}
        onCorrect={run.correct}
        onClose={onClose}
      />
      <ReasonDialog
        open={asked === 'finish'}
        title="Finish this run"
        deed="Finish run"
        onDo={async () => {
          const trouble = await run.finish();
          if (trouble === null) location.reload();
          return trouble;
        }}
        onClose={onClose}
      >
        <p>{summaryHead(summary)}</p>
        {summaryFaults(summary).map((fault) => (
          <p key={fault}>{fault}</p>
        ))}
        <p className="text-ink-soft">A finished run takes no more steps. Readings can still be corrected.</p>
      </ReasonDialog>
      <KeyList open={asked === 'keys'} onClose={onClose} />
    </>
  );
}

/** The row a correction is for: the one that is picked, else the newest that was read. */
function rowToCorrect(rows: readonly LadderRow[], picked: number | null): LadderRow | null {
  const chosen = picked === null ? undefined : rows.find(({ seq, withdrawn }) => seq === picked && withdrawn === null);
  return (
    chosen ??
    rows.findLast(({ judged }) => judged !== null) ??
    rows.findLast(({ withdrawn }) => withdrawn === null) ??
    null
  );
}

/** A run being logged: the ladder above, the line below it; a keyboard alone is enough. */
export function RunBench(props: RunProps): ReactElement {
  const run = useRun(props);
  const [asked, setAsked] = useState<Deed | null>(null);
  const [picked, setPicked] = useState<number | null>(null);
  const onDeed = useCallback((deed: Deed) => setAsked(deed), []);
  const control = useEntry(run, onDeed);
  const { entry } = control;
  const close = (): void => {
    setAsked(null);
    control.focus();
  };
  return (
    <div className="grid gap-4">
      <Ladder
        layout={run.layout}
        rows={run.rows}
        excluded={props.excluded}
        live
        room="short"
        label={`Run ${props.number}: steps by wheels`}
        onPick={({ seq }) => setPicked(seq)}
      />
      <section
        aria-label="Entry"
        className="z-20 -mx-4 grid gap-x-10 gap-y-3 border-ink bg-leaf px-4 py-3 max-md:order-first max-md:border-b md:sticky md:bottom-0 md:-mx-8 md:border-t-2 md:px-8 lg:grid-cols-[minmax(0,1fr)_minmax(0,35rem)] print:hidden"
      >
        <EntryLine {...control} layout={run.layout} onKeys={() => setAsked('keys')} />
        <div className="grid content-start gap-3">
          <div className="grid gap-2 max-md:order-first">
            <SaveMark state={run.saving} />
            <Verdict row={run.rows.at(-1)} />
          </div>
          <Stopped
            state={run.saving}
            here={paths.run(props.id)}
            onAgain={run.again}
            onPutAfter={() => void run.putAfter()}
            onDiscard={() => void run.discard()}
          />
          <Controls layout={run.layout} entry={entry} onCommand={control.onCommand} />
        </div>
      </section>
      <RunActions run={run} mayLog={props.mayLog} machineRuns={paths.runs()} />
      <Dialogs run={run} asked={asked} picked={rowToCorrect(run.rows, picked)} onClose={close} />
    </div>
  );
}
