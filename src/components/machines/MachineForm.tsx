import { type FormEvent, type ReactElement, useState } from 'react';
import { LayoutDrawing } from '@/components/mechanism/LayoutDrawing';
import { Button } from '@/components/ui/Button';
import { Field, SelectField } from '@/components/ui/Field';
import { FIELD, PANEL } from '@/components/ui/look';
import { Notice } from '@/components/ui/Notice';
import { call, problemWords } from '@/lib/client/call';
import { paths } from '@/lib/paths';
import type { MachineShown } from '@/lib/schemas/machine-shapes';
import { MACHINE_STATE_WORDS, MACHINE_STATES } from '@/lib/schemas/machines';
import {
  describedLayout,
  type FormErrors,
  type FormField,
  formValues,
  layoutValues,
  machineBody,
  STARTING_LAYOUTS,
  serverErrors,
  typedLayout,
} from './form-values';
import { LayoutFieldset } from './LayoutFields';
import { useUnsavedWarning } from './useUnsavedWarning';

interface Props {
  /** The machine to change; null enters a new one. */
  readonly machine: MachineShown | null;
}

/** Whether the layout in the fields is another one than the machine's, and what saving does about it. */
function layoutNote(machine: MachineShown | null, typed: string): string | null {
  if (!machine || typed === JSON.stringify(describedLayout(formValues(machine)))) return null;
  const { layoutRevision } = machine;
  const runs = machine.revisions.find(({ revision }) => revision === layoutRevision)?.runs ?? 0;
  if (runs === 0) return 'No run has been logged on this layout yet, so saving changes it in place.';
  const many = runs === 1 ? 'One run was' : `${runs} runs were`;
  return `${many} logged on revision ${layoutRevision}, which stays as it is. Saving makes revision ${layoutRevision + 1}; new runs use that one.`;
}

/** Enters or changes a machine, with its layout drawn as it is typed. */
export function MachineForm({ machine }: Props): ReactElement {
  const first = formValues(machine);
  const [values, setValues] = useState(first);
  const [told, setTold] = useState<FormErrors>({});
  const [refused, setRefused] = useState('');
  const [sending, setSending] = useState(false);
  const [done, setDone] = useState(false);
  const { layout, errors: layoutErrors } = typedLayout(values);
  const [drawn, setDrawn] = useState(layout);
  const errors = { ...told, ...layoutErrors };
  useUnsavedWarning(!done && JSON.stringify(values) !== JSON.stringify(first));
  // While a count is half typed the last drawing that made sense stays.
  if (layout && JSON.stringify(layout) !== JSON.stringify(drawn)) setDrawn(layout);

  const change = (field: FormField, value: string | boolean): void => {
    setValues((before) => ({ ...before, [field]: value }));
    setTold(({ [field]: _, ...rest }) => rest);
  };
  const text = (field: 'name' | 'serial' | 'scale' | 'turnsBefore') => ({
    name: field,
    value: values[field],
    error: errors[field],
    autoComplete: 'off',
    onChange: (event: { target: { value: string } }) => change(field, event.target.value),
  });

  const save = async (event: FormEvent): Promise<void> => {
    event.preventDefault();
    if (!layout) {
      document.querySelector<HTMLElement>('[aria-invalid=true]')?.focus();
      return;
    }
    setSending(true);
    setRefused('');
    const body = machineBody(values);
    const answer = machine
      ? await call<MachineShown>('PATCH', paths.api.machine(machine.id), { ...body, version: machine.version })
      : await call<MachineShown>('POST', paths.api.machines, body);
    setSending(false);
    if (answer.ok) {
      setDone(true);
      // After the warning about unsaved fields has been taken off.
      setTimeout(() => window.location.assign(paths.machine(answer.value.id)));
      return;
    }
    const { fields, rest } = serverErrors(answer.problem.errors);
    setTold(fields);
    const general = answer.kind === 'signed-out' ? 'You are signed out. Sign in in another tab, then save again.' : '';
    setRefused(general || [problemWords({ ...answer.problem, errors: [] }), ...rest].join(' '));
    requestAnimationFrame(() => document.querySelector<HTMLElement>('[aria-invalid=true]')?.focus());
  };

  const note = layoutNote(machine, JSON.stringify(describedLayout(values)));
  return (
    <form onSubmit={save} noValidate>
      {refused && (
        <div className="mb-8">
          <Notice kind="refused">{refused}</Notice>
        </div>
      )}
      <section className={PANEL.wrap} aria-labelledby="machine-facts">
        <div className={PANEL.grid}>
          <h2 id="machine-facts" className={PANEL.title}>
            The machine
          </h2>
          <div className="grid max-w-2xl gap-5 sm:grid-cols-2">
            <Field label="Name" required className="sm:col-span-2" {...text('name')} />
            <Field label="Serial" {...text('serial')} />
            <Field label="Scale" hint="times its original’s size: 2 = twice" inputMode="decimal" {...text('scale')} />
            <SelectField
              label="State"
              name="state"
              required
              options={MACHINE_STATES.map((value) => ({ value, label: MACHINE_STATE_WORDS[value] }))}
              value={values.state}
              error={errors.state}
              onChange={(event) => change('state', event.target.value)}
            />
            <Field
              label="Turns before the log"
              hint="the odometer starts from there"
              required
              inputMode="numeric"
              {...text('turnsBefore')}
            />
            <div className={`${FIELD.wrap} sm:col-span-2`}>
              <label htmlFor="machine-note" className={FIELD.label}>
                Note <span className={FIELD.optional}>(optional)</span>
              </label>
              <textarea
                id="machine-note"
                rows={3}
                className={FIELD.control}
                value={values.note}
                aria-invalid={errors.note ? true : undefined}
                aria-describedby={errors.note ? 'machine-note-error' : undefined}
                onChange={(event) => change('note', event.target.value)}
              />
              {errors.note && (
                <p id="machine-note-error" className={FIELD.error}>
                  {errors.note}
                </p>
              )}
            </div>
          </div>
        </div>
      </section>
      <section className={PANEL.wrap} aria-labelledby="machine-layout">
        <div className={PANEL.grid}>
          <div>
            <h2 id="machine-layout" className={PANEL.title}>
              Layout
            </h2>
            <p className={PANEL.aside}>Begin from one of these, then change what differs.</p>
            <div className="mt-3 flex flex-wrap gap-2">
              {STARTING_LAYOUTS.map((one) => (
                <Button
                  key={one.name}
                  variant="quiet"
                  onClick={() => setValues((before) => ({ ...before, ...layoutValues(one.layout) }))}
                >
                  {one.name}
                </Button>
              ))}
            </div>
          </div>
          <div className="grid min-w-0 gap-8 xl:grid-cols-[minmax(0,1fr)_minmax(0,1fr)]">
            <LayoutFieldset values={values} errors={errors} change={change} />
            <div className="min-w-0 overflow-x-auto">{drawn && <LayoutDrawing layout={drawn} />}</div>
            {note && (
              <div className="xl:col-span-2">
                <Notice>{note}</Notice>
              </div>
            )}
          </div>
        </div>
      </section>
      <div className="flex flex-wrap gap-3 border-t border-ink pt-4">
        <Button type="submit" disabled={sending}>
          {sending ? 'Saving' : machine ? 'Save the machine' : 'Enter the machine'}
        </Button>
        <a className="link flex min-h-11 items-center px-2" href={machine ? paths.machine(machine.id) : paths.machines}>
          Leave it
        </a>
      </div>
    </form>
  );
}
