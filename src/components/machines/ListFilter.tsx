import type { ReactElement } from 'react';
import { Field, SelectField } from '@/components/ui/Field';
import type { Change as ChangeOf } from '@/components/ui/useAddressView';
import { paths } from '@/lib/paths';
import { MACHINE_STATE_WORDS, MACHINE_STATES } from '@/lib/schemas/machines';
import { type ListView, PLAIN_VIEW, readView, SIZES } from './list-view';

type Change = ChangeOf<ListView>;

const STATES = [
  { value: '', label: 'every state' },
  ...MACHINE_STATES.map((state) => ({ value: state, label: MACHINE_STATE_WORDS[state] })),
];
const PER_PAGE = SIZES.map((size) => ({ value: String(size), label: `${size} a page` }));

/** What the list is narrowed by. Enter sends the form where no script runs. */
export function ListFilter({ view, change }: { view: ListView; change: Change }): ReactElement {
  return (
    <form
      method="get"
      action={paths.machines}
      className="grid gap-4 sm:grid-cols-[minmax(0,2fr)_minmax(0,1fr)_minmax(0,10rem)]"
      onSubmit={(event) => event.preventDefault()}
    >
      {view.sort !== PLAIN_VIEW.sort && <input type="hidden" name="sort" value={view.sort} />}
      {view.falling && <input type="hidden" name="falling" value="1" />}
      <Field
        label="Find"
        id="find-machine"
        required
        type="search"
        name="text"
        maxLength={80}
        placeholder="Name, serial, layout"
        value={view.text}
        onChange={({ target }) => change({ text: target.value }, 'typing')}
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
        label="Rows"
        id="find-size"
        required
        name="size"
        options={PER_PAGE}
        value={String(view.size)}
        onChange={({ target }) => change({ size: readView(`?size=${target.value}`).size })}
      />
    </form>
  );
}
