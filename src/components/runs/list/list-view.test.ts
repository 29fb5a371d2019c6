import { describe, expect, it } from 'vitest';
import { PLAIN_VIEW, readView, SORTS, writeView } from './list-view';

describe('the address of the list of runs', () => {
  it('is empty for the plain list', () => {
    expect(writeView(PLAIN_VIEW)).toBe('');
    expect(readView('')).toEqual(PLAIN_VIEW);
  });

  it('leads back to the same list, however it is sorted', () => {
    const machine = '01940000-0000-7000-8000-000000000001';
    for (const sort of SORTS)
      for (const falling of [true, false]) {
        const view = {
          text: 'á & b',
          machine,
          state: 'open',
          trouble: 'differs',
          sort,
          falling,
          page: 3,
          size: 10,
        } as const;
        expect(readView(writeView(view))).toEqual(view);
      }
  });

  it('takes plain values for what it does not know', () => {
    expect(readView('?state=broken&trouble=1&machine=../x&page=0&size=7')).toEqual(PLAIN_VIEW);
  });
});
