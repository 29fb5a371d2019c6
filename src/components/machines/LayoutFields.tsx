import type { ReactElement } from 'react';
import { Field, SelectField } from '@/components/ui/Field';
import { LAYOUT_COUNTS, type LayoutCount, SUBTRACTIONS, type Subtraction } from '@/lib/mechanism/layout';
import type { FormErrors, FormField, FormValues } from './form-values';
import { COUNT_FIELDS } from './form-values';

const COUNT_WORDS: Record<LayoutCount, { readonly label: string; readonly hint: string }> = {
  settingSlides: { label: 'Setting slides', hint: 'usually 8 to 11' },
  resultWheels: { label: 'Result wheels', hint: 'usually 11 to 16' },
  counterWheels: { label: 'Counter wheels', hint: 'usually 6 to 8; 0 = none' },
  carriagePositions: { label: 'Carriage positions', hint: 'usually 6 to 8' },
};

const SUBTRACTION_CHOICES: Record<Subtraction, string> = {
  complement: 'Nines’ complement: wheels still turn forward',
  reverse: 'Reverse: wheels turn backward',
  none: 'None: the machine only adds',
};

interface Props {
  readonly values: FormValues;
  readonly errors: FormErrors;
  readonly change: (field: FormField, value: string | boolean) => void;
}

/** The fields of a layout, with ranges and what they mean. */
export function LayoutFieldset({ values, errors, change }: Props): ReactElement {
  return (
    <div className="grid gap-5 sm:grid-cols-2">
      {COUNT_FIELDS.map((field) => (
        <Field
          key={field}
          name={field}
          label={COUNT_WORDS[field].label}
          hint={`${LAYOUT_COUNTS[field].from} to ${LAYOUT_COUNTS[field].to}, ${COUNT_WORDS[field].hint}`}
          required
          inputMode="numeric"
          autoComplete="off"
          value={values[field]}
          error={errors[field]}
          onChange={(event) => change(field, event.target.value)}
        />
      ))}
      <SelectField
        name="subtraction"
        label="Subtraction"
        required
        className="sm:col-span-2"
        options={SUBTRACTIONS.map((value) => ({ value, label: SUBTRACTION_CHOICES[value] }))}
        value={values.subtraction}
        error={errors.subtraction}
        onChange={(event) => change('subtraction', event.target.value)}
      />
      {values.subtraction === 'complement' && (
        <Field
          name="complementColumns"
          label="Complement columns"
          hint="from the lowest slide; empty = up to the highest wheel"
          inputMode="numeric"
          autoComplete="off"
          value={values.complementColumns}
          error={errors.complementColumns}
          onChange={(event) => change('complementColumns', event.target.value)}
        />
      )}
      <Field
        name="resultCarry"
        label="Carry reaches"
        hint="wheels above the lowest driven one; empty = all"
        inputMode="numeric"
        autoComplete="off"
        value={values.resultCarry}
        error={errors.resultCarry}
        onChange={(event) => change('resultCarry', event.target.value)}
      />
      <label className="flex min-h-11 items-center gap-3 sm:col-span-2">
        <input
          type="checkbox"
          name="counterCarry"
          className="size-5 accent-verdigris"
          checked={values.counterCarry}
          onChange={(event) => change('counterCarry', event.target.checked)}
        />
        The revolution counter has a tens carry of its own
      </label>
    </div>
  );
}
