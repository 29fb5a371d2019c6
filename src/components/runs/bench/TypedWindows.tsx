import type { ReactElement } from 'react';
import type { Layout } from '@/lib/mechanism/layout';
import { takeApart, wheelsOf, windowsOf } from './reading';
import { Windows } from './Windows';

/** The windows of both registers as the line stands. Blank where it says nothing, or nothing that can be taken. */
export function TypedWindows({ text, layout }: { text: string; layout: Layout }): ReactElement {
  const typed = takeApart(text, layout);
  const of = (register: 'result' | 'counter'): ReactElement => {
    const wheels = wheelsOf(layout, register);
    const shown = typeof typed === 'string' ? null : windowsOf(typed[register], wheels);
    return (
      <Windows name={register === 'result' ? 'Result' : 'Counter'} windows={shown ?? windowsOf('', wheels) ?? []} />
    );
  };
  return (
    <div className="flex flex-wrap gap-x-6 gap-y-2">
      {of('result')}
      {layout.counterWheels > 0 && of('counter')}
    </div>
  );
}
