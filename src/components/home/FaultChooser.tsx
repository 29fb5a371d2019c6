import type { ReactElement } from 'react';
import { SelectField } from '@/components/ui/Field';
import type { Fault } from '@/lib/mechanism/faults';
import type { Layout } from '@/lib/mechanism/layout';
import { choiceOf, FAULT_CHOICES, placeOf } from './fault-choices';

interface Props {
  readonly layout: Layout;
  readonly fault: Fault | null;
  readonly onGive: (fault: Fault | null) => void;
}

const NONE = 'none';

/** What is wrong with the machine: one cause at one place, or nothing. */
export function FaultChooser({ layout, fault, onGive }: Props): ReactElement {
  const choice = fault ? choiceOf(fault.kind) : null;
  const places = choice?.places(layout);
  const numbers = places ? Array.from({ length: places.to - places.from + 1 }, (_, index) => places.from + index) : [];
  const giveKind = (kind: string): void => {
    const chosen = choiceOf(kind);
    onGive(chosen ? chosen.at(chosen.places(layout).from) : null);
  };
  return (
    <fieldset className="grid gap-3 sm:grid-cols-[minmax(0,1fr)_9.5rem]">
      <legend className="sr-only">Fault of the machine</legend>
      <SelectField
        label="Give it a fault"
        required
        value={fault?.kind ?? NONE}
        options={[
          { value: NONE, label: 'None: a healthy machine' },
          ...FAULT_CHOICES.map(({ kind, words }) => ({ value: kind, label: words })),
        ]}
        onChange={(event) => giveKind(event.target.value)}
      />
      {choice && places && fault && (
        <SelectField
          label={places.word}
          required
          value={String(placeOf(fault))}
          options={numbers.map((number) => ({ value: String(number), label: String(number) }))}
          onChange={(event) => onGive(choice.at(Number(event.target.value)))}
        />
      )}
    </fieldset>
  );
}
