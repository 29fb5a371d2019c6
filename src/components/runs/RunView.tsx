import { type ReactElement, useState } from 'react';
import { Ladder } from '@/components/ladder/Ladder';
import type { LadderRow } from '@/components/ladder/rows';
import { Button } from '@/components/ui/Button';
import { paths } from '@/lib/paths';
import { CorrectDialog } from './bench/CorrectDialog';
import { SaveMark, Stopped } from './bench/SaveMark';
import { useRun } from './bench/useRun';
import { RunActions } from './RunActions';
import type { RunProps } from './run-props';

/** A run that is looked at: finished, or somebody else's to log. A picked reading can still be corrected by those who may. */
export function RunView(props: RunProps): ReactElement {
  const run = useRun(props);
  const [picked, setPicked] = useState<number | null>(null);
  const [correcting, setCorrecting] = useState(false);
  const row: LadderRow | null = run.rows.find(({ seq }) => seq === picked) ?? null;
  const mayCorrect = props.mayLog && row !== null && row.withdrawn === null;
  return (
    <div className="grid gap-4">
      {run.saving.is !== 'saved' && (
        <div className="grid gap-3">
          <SaveMark state={run.saving} />
          <Stopped
            state={run.saving}
            here={paths.run(props.id)}
            onAgain={run.again}
            onPutAfter={() => void run.putAfter()}
            onDiscard={() => void run.discard()}
          />
        </div>
      )}
      <Ladder
        layout={run.layout}
        rows={run.rows}
        excluded={props.excluded}
        label={`Run ${props.number}: steps by wheels`}
        onPick={({ seq }) => setPicked(seq)}
      />
      <div className="flex flex-wrap items-center gap-2 print:hidden">
        {mayCorrect && (
          <Button variant="quiet" onClick={() => setCorrecting(true)}>
            {row.judged ? `Correct the reading of step ${row.seq}` : `Add a reading to step ${row.seq}`}
          </Button>
        )}
        <RunActions run={run} mayLog={props.mayLog} machineRuns={paths.runs()} />
      </div>
      <CorrectDialog
        open={correcting}
        layout={run.layout}
        row={row}
        onCorrect={run.correct}
        onClose={() => {
          setCorrecting(false);
          // The summary at the head of the page is drawn by the server.
          if (props.finished) location.reload();
        }}
      />
    </div>
  );
}
