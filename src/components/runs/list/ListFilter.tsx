import type { ReactElement } from 'react';
import { Field, SelectField } from '@/components/ui/Field';
import type { Change as ChangeOf } from '@/components/ui/useAddressView';
import { paths } from '@/lib/paths';
import { RUN_STATE_WORDS, RUN_STATES, TROUBLE_WORDS, TROUBLES } from './list-row';
import { type ListView, PLAIN_VIEW, readView } from './list-view';

type Change = ChangeOf<ListView>;

const STATES = [{ value: '', label: 'going on or finished' }].concat(
  RUN_STATES.map((state) => ({ value: state, label: RUN_STATE_WORDS[state] })),
);
const KINDS = [{ value: '', label: 'with or without' }].concat(
  TROUBLES.map((trouble) => ({ value: trouble, label: TROUBLE_WORDS[trouble] })),
);

interface Props {
  readonly view: ListView;
  readonly machines: readonly { readonly id: string; readonly name: string }[];
  readonly change: Change;
}

/** What the list is narrowed by. Enter sends the form where no script runs. */
export function ListFilter({ view, machines, change }: Props): ReactElement {
  return (
    <form
      method="get"
      action={paths.runs()}
      className="grid gap-4 sm:grid-cols-2 lg:grid-cols-4"
      onSubmit={(event) => event.preventDefault()}
    >
      {view.sort !== PLAIN_VIEW.sort && <input type="hidden" name="sort" value={view.sort} />}
      {view.falling !== PLAIN_VIEW.falling && <input type="hidden" name="order" value="rising" />}
      {view.sort !== PLAIN_VIEW.sort && view.falling && <input type="hidden" name="order" value="falling" />}
      <Field
        label="Find"
        id="find-run"
        required
        type="search"
        name="text"
        maxLength={80}
        placeholder="Number, title, tester"
        value={view.text}
        onChange={({ target }) => change({ text: target.value }, 'typing')}
      />
      <SelectField
        label="Machine"
        id="find-machine"
        required
        name="machine"
        options={[
          { value: '', label: 'every machine' },
          ...machines.map(({ id, name }) => ({ value: id, label: name })),
        ]}
        value={view.machine ?? ''}
        onChange={({ target }) => change({ machine: target.value || null })}
      />
      <SelectField
        label="State"
        id="find-state"
        required
        name="state"
        options={STATES}
        value={view.state ?? ''}
        onChange={({ target }) => change({ state: readView(`?state=${target.value}`).state })}
      />
      <SelectField
        label="Trouble"
        id="find-trouble"
        required
        name="trouble"
        options={KINDS}
        value={view.trouble ?? ''}
        onChange={({ target }) => change({ trouble: readView(`?trouble=${target.value}`).trouble })}
      />
    </form>
  );
}
