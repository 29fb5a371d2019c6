import {
  acceptLayout,
  LAYOUT_COUNTS,
  type Layout,
  type LayoutCount,
  type LayoutDescription,
  type Subtraction,
} from '@/lib/mechanism/layout';
import { type LayoutFields, layoutFields } from '@/lib/schemas/layout';
import type { MachineShown } from '@/lib/schemas/machine-shapes';
import type { MachineState } from '@/lib/schemas/machines';
import { detailOf } from '@/lib/schemas/words';

/** What stands in the fields of the form, as typed. */
export interface FormValues {
  readonly name: string;
  readonly serial: string;
  readonly scale: string;
  readonly state: MachineState;
  readonly turnsBefore: string;
  readonly note: string;
  readonly settingSlides: string;
  readonly resultWheels: string;
  readonly counterWheels: string;
  readonly carriagePositions: string;
  readonly subtraction: Subtraction;
  readonly complementColumns: string;
  readonly resultCarry: string;
  readonly counterCarry: boolean;
}
export type FormField = keyof FormValues;
export type FormErrors = Partial<Record<FormField, string>>;

export const COUNT_FIELDS = Object.keys(LAYOUT_COUNTS) as LayoutCount[];

/** Layouts to begin from. Sizes only: they stand for no particular machine. */
export const STARTING_LAYOUTS: readonly { readonly name: string; readonly layout: LayoutDescription }[] = [
  { name: 'Usual', layout: {} },
  { name: 'Small', layout: { settingSlides: 6, resultWheels: 9, counterWheels: 5, carriagePositions: 4 } },
  { name: 'Wide', layout: { settingSlides: 11, resultWheels: 15, counterWheels: 8, carriagePositions: 8 } },
  {
    name: 'Turning backward',
    layout: { settingSlides: 9, resultWheels: 13, counterWheels: 8, carriagePositions: 8, subtraction: 'reverse' },
  },
];

const orEmpty = (value: number | null): string => (value === null ? '' : String(value));

/** A layout as the fields show it; what is left out takes the usual values. */
export function layoutValues(described: LayoutDescription): Pick<FormValues, keyof LayoutFields> {
  const accepted = acceptLayout(described);
  if (!accepted.ok) throw new Error('Only layouts that a machine can have are put into the form.');
  const fields = layoutFields(accepted.value);
  return {
    settingSlides: String(fields.settingSlides),
    resultWheels: String(fields.resultWheels),
    counterWheels: String(fields.counterWheels),
    carriagePositions: String(fields.carriagePositions),
    subtraction: fields.subtraction,
    complementColumns: orEmpty(fields.complementColumns),
    resultCarry: orEmpty(fields.resultCarry),
    counterCarry: fields.counterCarry,
  };
}

/** The fields for a machine that exists, or for a new one. */
export function formValues(machine: MachineShown | null): FormValues {
  return {
    name: machine?.name ?? '',
    serial: machine?.serial ?? '',
    scale: orEmpty(machine?.scale ?? null),
    state: machine?.state ?? 'being-built',
    turnsBefore: String(machine?.turnsBefore ?? 0),
    note: machine?.note ?? '',
    ...layoutValues(machine?.layout ?? {}),
  };
}

/** A field with a whole number in it: only digits are one; anything else is kept out of the layout as not a number. */
const whole = (text: string): number => (/^\d{1,4}$/u.test(text.trim()) ? Number(text) : Number.NaN);
const orNull = (text: string): number | null => (text.trim() === '' ? null : whole(text));

export function describedLayout(values: FormValues): LayoutDescription {
  return {
    settingSlides: whole(values.settingSlides),
    resultWheels: whole(values.resultWheels),
    counterWheels: whole(values.counterWheels),
    carriagePositions: whole(values.carriagePositions),
    subtraction: values.subtraction,
    complementColumns: values.subtraction === 'complement' ? orNull(values.complementColumns) : null,
    resultCarry: orNull(values.resultCarry),
    counterCarry: values.counterCarry,
  };
}

/** The layout that stands in the fields, or what is wrong with it field by field. */
export function typedLayout(values: FormValues): { readonly layout: Layout | null; readonly errors: FormErrors } {
  const accepted = acceptLayout(describedLayout(values));
  if (accepted.ok) return { layout: accepted.value, errors: {} };
  const errors: FormErrors = {};
  for (const problem of accepted.problems) errors[problem.path[0] as FormField] ??= detailOf(problem);
  return { layout: null, errors };
}

/** The body that enters or changes a machine; the server has the last word on it. */
export function machineBody(values: FormValues): Record<string, unknown> {
  const scale = values.scale.trim().replace(',', '.');
  return {
    name: values.name,
    serial: values.serial,
    scale: scale === '' ? null : Number(scale),
    state: values.state,
    // What is no number becomes NaN, hence null in JSON, and the server says what it wants instead.
    turnsBefore: /^\d+$/u.test(values.turnsBefore.trim()) ? Number(values.turnsBefore) : Number.NaN,
    note: values.note,
    layout: describedLayout(values),
  };
}

/** Server's words by field; what belongs to none is answered as the rest. */
export function serverErrors(errors: readonly { readonly pointer: string; readonly detail: string }[]): {
  readonly fields: FormErrors;
  readonly rest: readonly string[];
} {
  const known = new Set<string>(Object.keys(formValues(null)));
  const fields: FormErrors = {};
  const rest: string[] = [];
  for (const { pointer, detail } of errors) {
    const name = pointer.split('/').at(-1) ?? '';
    if (known.has(name)) fields[name as FormField] ??= detail;
    else rest.push(detail);
  }
  return { fields, rest };
}
