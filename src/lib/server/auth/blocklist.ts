import { dictionary } from '@zxcvbn-ts/language-common';

/** Common passwords long enough to pass the length rule: the only ones that still have to be refused. */
const COMMON = new Set((dictionary['passwords-common'] ?? []).map(String).filter((word) => [...word].length >= 15));

/** Runs of keys and letters that people take when a rule asks for length. */
const RUNS = [
  'abcdefghijklmnopqrstuvwxyz',
  '01234567890123456789',
  'qwertyuiopasdfghjklzxcvbnm',
  'qwertzuiopasdfghjklyxcvbnm',
  'azertyuiopqsdfghjklmwxcvbn',
];

const plain = (text: string): string => text.toLowerCase().replaceAll(/[^\p{L}\p{N}]/gu, '');

/** True for one short unit over and over: `aaaaaaaaaaaaaaa`, `passwordpassword`. */
function isRepeated(text: string): boolean {
  for (let unit = 1; unit <= text.length / 2; unit += 1)
    if (
      text
        .slice(0, unit)
        .repeat(Math.ceil(text.length / unit))
        .slice(0, text.length) === text
    )
      return true;
  return false;
}

function isRun(text: string): boolean {
  const reversed = [...text].reverse().join('');
  return RUNS.some((run) => run.repeat(2).includes(text) || run.repeat(2).includes(reversed));
}

/**
 * Why a password is too easy to guess, or null. NIST SP 800-63B-4 section 3.1.1.2 asks for a list of common, expected
 * and compromised values and forbids rules of composition. `context` are words an attacker would try first.
 */
export function guessable(password: string, context: readonly string[]): string | null {
  const text = plain(password);
  if (COMMON.has(password.toLowerCase()) || COMMON.has(text)) return 'It is on the list of the most common passwords.';
  if (text.length < 4 || isRepeated(text)) return 'It repeats one short piece.';
  if (isRun(text)) return 'It is a run of neighbouring keys or letters.';
  const rest = context
    .flatMap((word) => [plain(word), ...word.split(/[@\s.]+/).map(plain)])
    .filter((word) => word.length >= 4)
    .reduce((left, word) => left.replaceAll(word, ''), text);
  return rest.length < 6 ? 'Little is left of it without your name, e-mail, workshop or the name of this site.' : null;
}
