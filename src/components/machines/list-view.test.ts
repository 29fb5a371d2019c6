import { describe, expect, it } from 'vitest';
import { PLAIN_VIEW, readView, writeView } from './list-view';

describe('the address of the list', () => {
  it('is empty for the plain list', () => {
    expect(writeView(PLAIN_VIEW)).toBe('');
    expect(readView('')).toEqual(PLAIN_VIEW);
  });

  it('leads back to the same list', () => {
    const view = { text: 'á & b', state: 'under-test', sort: 'turns', falling: true, page: 3, size: 10 } as const;
    expect(readView(writeView(view))).toEqual(view);
  });

  it('takes plain values for what it does not know', () => {
    expect(readView('?state=broken&sort=__proto__&page=0&size=7&falling=yes')).toEqual(PLAIN_VIEW);
    expect(readView('?page=1e3').page).toBe(1);
  });
});
