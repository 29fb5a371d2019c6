import type { ReactElement } from 'react';
import type { Layout } from '@/lib/mechanism/layout';
import { COMMANDS, type Command, type Entry } from './console';

const GROUPS: readonly { readonly name: string; readonly commands: readonly Command[] }[] = [
  { name: 'The turn', commands: ['add', 'subtract', 'times', 'bare'] },
  { name: 'The machine', commands: ['slides', 'carriage', 'clear', 'reverse'] },
  { name: 'The record', commands: ['note', 'take-back', 'correct', 'finish', 'keys'] },
];
const SHORT: Partial<Record<Command, string>> = {
  slides: 'Slides',
  carriage: 'Carriage',
  reverse: 'Reverse',
  'take-back': 'Take back',
  correct: 'Correct',
  add: 'Add',
  subtract: 'Subtract',
  times: 'Times',
  bare: 'No reading',
};
const KEY: Record<string, string> = { '+': '+', '-': '−', '*': '×' };

function isPressed(command: Command, { way, times }: Entry): boolean | undefined {
  if (command === 'add' || command === 'subtract') return way === command;
  return command === 'times' ? times > 1 : undefined;
}

interface Props {
  readonly layout: Layout;
  readonly entry: Entry;
  readonly onCommand: (command: Command) => void;
}

/** Everything that a key does, for a finger or a mouse; each says its key. */
export function Controls({ layout, entry, onCommand }: Props): ReactElement {
  return (
    <div className="grid gap-1.5">
      {GROUPS.map(({ name, commands }) => (
        <fieldset key={name} className="min-w-0">
          <legend className="sr-only">{name}</legend>
          <div className="flex flex-wrap gap-px">
            {commands.map((command) => (
              <button
                key={command}
                type="button"
                aria-pressed={isPressed(command, entry)}
                disabled={command === 'subtract' && layout.subtraction === 'none'}
                onClick={() => onCommand(command)}
                className="flex min-h-11 grow items-center justify-between gap-2 border border-rule-firm bg-leaf px-2.5 text-sm hover:border-ink hover:bg-verdigris-wash disabled:text-ink-soft aria-pressed:bg-ink aria-pressed:text-paper"
              >
                {SHORT[command] ?? COMMANDS[command].word}
                <kbd className="border border-current px-1 text-xs leading-4">
                  {KEY[COMMANDS[command].keys[0]] ?? COMMANDS[command].keys[0].toUpperCase()}
                </kbd>
              </button>
            ))}
          </div>
        </fieldset>
      ))}
    </div>
  );
}
