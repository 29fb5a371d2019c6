import { type ReactElement, useState } from 'react';
import { Button } from '@/components/ui/Button';
import { ReasonDialog } from './bench/ReasonDialog';
import type { LiveRun } from './bench/useRun';

interface Props {
  readonly run: LiveRun;
  readonly mayLog: boolean;
  /** Where to go when the run is deleted. */
  readonly machineRuns: string;
}

/** What is done with a run as a whole: printing it, and deleting it while nothing was ever logged. */
export function RunActions({ run, mayLog, machineRuns }: Props): ReactElement {
  const [asked, setAsked] = useState(false);
  return (
    <div className="flex flex-wrap gap-2 print:hidden">
      <Button variant="quiet" onClick={() => print()}>
        Print
      </Button>
      {mayLog && run.rows.length === 0 && (
        <Button variant="danger" onClick={() => setAsked(true)}>
          Delete this empty run
        </Button>
      )}
      <ReasonDialog
        open={asked}
        title="Delete this run"
        deed="Delete run"
        danger
        onDo={async () => {
          const trouble = await run.remove();
          if (trouble === null) location.assign(machineRuns);
          return trouble;
        }}
        onClose={() => setAsked(false)}
      >
        <p>Nothing was logged in it. It is gone for good.</p>
      </ReasonDialog>
    </div>
  );
}
