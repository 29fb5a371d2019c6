import { describe, expect, it } from 'vitest';
import { decodeCsv } from './decode';
import { CSV_LIMITS } from './limits';

const codeOf = (bytes: Uint8Array | readonly number[]): string | undefined => {
  const decoded = decodeCsv(Uint8Array.from(bytes));
  return decoded.ok ? undefined : decoded.problems[0]?.code;
};

describe('decodeCsv', () => {
  it('keeps every character, the byte order mark too', () => {
    const text = '\uFEFFstep,note\r\n1,× “firm” 🛠\r\n';
    expect(decodeCsv(new TextEncoder().encode(text))).toEqual({ ok: true, value: text });
    expect(decodeCsv(new Uint8Array(0))).toEqual({ ok: true, value: '' });
  });

  it('refuses other encodings instead of guessing', () => {
    expect(codeOf(Buffer.from('note\r\nfünf', 'latin1'))).toBe('not-utf-8');
    expect(codeOf([0xc3])).toBe('not-utf-8');
    expect(codeOf([0xed, 0xa0, 0x80])).toBe('not-utf-8');
    expect(codeOf(Buffer.from('\uFEFFstep,do', 'utf16le'))).toBe('utf-16');
    expect(codeOf(Buffer.from('step,do', 'utf16le'))).toBe('utf-16');
    expect(codeOf(Buffer.from('\uFEFFstep,do', 'utf16le').swap16())).toBe('utf-16');
    expect(codeOf(Buffer.from('step,do', 'utf16le').swap16())).toBe('utf-16');
  });

  it('refuses a file over the limit, and takes one at it', () => {
    expect(decodeCsv(new Uint8Array(CSV_LIMITS.bytes).fill(65)).ok).toBe(true);
    expect(codeOf(new Uint8Array(CSV_LIMITS.bytes + 1).fill(65))).toBe('file-too-large');
  });
});
