import { type ReactElement, useMemo, useState } from 'react';
import { RunLadder } from '@/components/ladder/RunLadder';
import { Button } from '@/components/ui/Button';
import { SelectField } from '@/components/ui/Field';
import { Notice } from '@/components/ui/Notice';
import { paths } from '@/lib/paths';
import type { CheckedFile } from '@/lib/schemas/import-shapes';
import type { LayoutFields } from '@/lib/schemas/layout';
import { layoutOf } from '../run-props';
import { counted } from '../summary';
import { clockWords } from '../times';
import { FilePicker } from './FilePicker';
import { LineTable } from './LineTable';
import { linesOf } from './lines';
import { useImport } from './useImport';

interface Props {
  readonly machines: readonly { readonly id: string; readonly name: string; readonly layout: LayoutFields }[];
  /** Chosen already; empty for none. */
  readonly machine: string;
}

/** The run as it will be judged. Positions left out are those of the moment it is stored, so they are not drawn here. */
function Preview({ checked, layout }: { checked: CheckedFile; layout: LayoutFields }): ReactElement {
  const accepted = useMemo(() => layoutOf(layout), [layout]);
  const entries = useMemo(
    () =>
      checked.rows.map(({ step, note, at }, index) => ({
        seq: index + 1,
        step,
        note,
        ...(at && { at: clockWords(at) }),
      })),
    [checked],
  );
  return <RunLadder layout={accepted} entries={entries} label="The run in this file: steps by wheels" />;
}

function Already({ already }: { already: NonNullable<CheckedFile['already']> }): ReactElement {
  return (
    <Notice title="Stored before">
      <p>
        The very same file is{' '}
        <a className="link" href={paths.run(already.runId)}>
          run {already.number}
        </a>{' '}
        on {already.machine} already. Store it again only if that is meant.
      </p>
    </Notice>
  );
}

function Verdict({ checked }: { checked: CheckedFile }): ReactElement {
  const { problems, rows, remarks } = checked;
  return (
    <>
      {problems.length > 0 ? (
        <Notice kind="refused" title={`${counted(problems.length, 'problem')} in this file`}>
          <p>Nothing can be stored from it. Put these lines right where the file comes from, then choose it again.</p>
        </Notice>
      ) : (
        <Notice
          title={rows.length === 0 ? 'There is no step in this file' : `${counted(rows.length, 'step')} understood`}
        >
          <p>
            {rows.length === 0
              ? 'Its first line names columns, and no row follows.'
              : 'Nothing is stored yet. Look it through, then store it.'}
          </p>
        </Notice>
      )}
      {remarks.length > 0 && (
        <ul className="grid gap-1 border-l-4 border-rule-firm pl-4">
          {remarks.map((remark) => (
            <li key={remark}>{remark}</li>
          ))}
        </ul>
      )}
    </>
  );
}

/** A file of a run: chosen, checked, looked through line by line, and only then stored, all of it or nothing. */
export function ImportRun({ machines, machine: chosen }: Props): ReactElement {
  const [machine, setMachine] = useState(chosen);
  const given = useImport();
  const { checked, busy, trouble } = given;
  const layout = machines.find(({ id }) => id === machine)?.layout;
  const lines = useMemo(() => (checked ? linesOf(checked) : []), [checked]);
  const storable = checked !== null && checked.problems.length === 0 && checked.rows.length > 0;
  return (
    <div className="grid gap-8">
      <div className="grid gap-6 md:grid-cols-2">
        <SelectField
          label="Machine"
          id="import-machine"
          required
          hint="Its layout says how many wheels a reading has."
          options={[
            { value: '', label: 'Choose a machine' },
            ...machines.map(({ id, name }) => ({ value: id, label: name })),
          ]}
          value={machine}
          onChange={({ target }) => {
            setMachine(target.value);
            void given.checkAgain(target.value);
          }}
        />
        <FilePicker name={given.name} onPick={(file) => void given.check(file, machine)} />
      </div>
      <div role="status" className={busy || (given.name !== '' && machine === '') ? '' : 'sr-only'}>
        {busy === 'checking' && 'Reading the file.'}
        {busy === 'storing' && 'Storing the run.'}
        {!busy && given.name !== '' && machine === '' && 'Choose the machine that this run was logged on.'}
      </div>
      {trouble && (
        <Notice kind="refused">
          <p>{trouble}</p>
        </Notice>
      )}
      {checked && layout && (
        <section className="grid gap-6" aria-label="What was understood">
          <Verdict checked={checked} />
          {checked.already && <Already already={checked.already} />}
          {storable && <Preview checked={checked} layout={layout} />}
          {storable && (
            <div className="flex flex-wrap items-center gap-4">
              <Button disabled={busy !== null} onClick={() => void given.store(machine)}>
                {checked.already
                  ? 'Store it again as another run'
                  : `Store ${counted(checked.rows.length, 'step')} as a run`}
              </Button>
              <span className="text-sm text-ink-soft">All of it or nothing. The file itself is kept with the run.</span>
            </div>
          )}
          {lines.length > 0 && <LineTable key={checked.sha256} lines={lines} problems={checked.problems.length} />}
        </section>
      )}
    </div>
  );
}
