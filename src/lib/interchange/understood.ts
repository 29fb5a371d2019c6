import type { Operation, Reading, Step } from '../mechanism/steps';

/** A step in plain words, for a person to check against what they meant. Not for machines to read. */
export function inWords(step: Step): string {
  return `${operationInWords(step)}; ${readingInWords(step.read)}`;
}

function operationInWords(step: Operation): string {
  switch (step.do) {
    case 'set':
      return `slides set to ${step.slides}`;
    case 'turn': {
      const times = step.times ?? 1;
      return `${times} ${times === 1 ? 'turn' : 'turns'} ${step.way === 'add' ? 'adding' : 'subtracting'}`;
    }
    case 'shift':
      return `carriage to position ${step.to}`;
    case 'reverse':
      return `reversing lever ${step.on ? 'on' : 'off'}`;
    case 'clear':
      return `${step.what === 'both' ? 'result and counter' : step.what} cleared`;
  }
}

function readingInWords(read: Reading | undefined): string {
  const parts = [
    read?.result === undefined ? '' : `result ${read.result}`,
    read?.counter === undefined ? '' : `counter ${read.counter}`,
  ].filter((part) => part !== '');
  return parts.length === 0 ? 'nothing read' : `read ${parts.join(', ')}`;
}
