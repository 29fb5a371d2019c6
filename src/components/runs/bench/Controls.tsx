import type { ReactElement } from 'react';
import type { Layout } from '@/lib/mechanism/layout';
import { COMMANDS, type Command, type Entry } from './console';

const GROUPS: readonly { readonly name: string; readonly commands: readonly Command[] }[] = [
  { name: 'The turn', commands: ['add', 'subtract', 'times', 'bare'] },
  { name: 'The machine', commands: ['slides', 'carriage', 'clear', 'reverse'] },
  { name: 'The record', commands: ['note', 'take-back', 'correct', 'finish', 'keys'] },
];
const SHORT: Partial<Record<Command, string>> = {
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
    <div className="grid gap-x-6 gap-y-3 lg:flex lg:flex-wrap">
      {GROUPS.map(({ name, commands }) => (
        <fieldset key={name} className="min-w-0">
          <legend className="mb-1 text-xs text-ink-soft">{name}</legend>
          <div className="grid grid-cols-2 gap-px border border-rule-firm bg-rule-firm sm:flex sm:flex-wrap sm:gap-0 sm:bg-transparent">
            {commands.map((command) => (
              <button
                key={command}
                type="button"
                aria-pressed={isPressed(command, entry)}
                disabled={command === 'subtract' && layout.subtraction === 'none'}
                onClick={() => onCommand(command)}
                className="flex min-h-11 items-center justify-between gap-2.5 bg-leaf px-3 text-sm hover:bg-verdigris-wash disabled:text-ink-soft aria-pressed:bg-ink aria-pressed:text-paper sm:border-r sm:border-rule sm:last:border-r-0"
              >
                {SHORT[command] ?? COMMANDS[command].word}
                <kbd className="border border-current px-1 text-xs leading-4 opacity-80">
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
