import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';

const root = path.resolve(import.meta.dirname, '..');
const read = (file: string): string => readFileSync(path.join(root, file), 'utf8');

/** Made when the commands first run; the documents may name it before. */
const MADE_LATER = ['.local', '.env'];
const TOP = ['src', 'tests', 'fixtures', 'drizzle', 'public', '.ci'];

/** Whatever in the text looks like a place in the repository. */
function pathsIn(text: string): string[] {
  const named = [...text.matchAll(/[`(]([\w.@[\]/-]+)[`)]/g)].map(([, place = '']) => place.replace(/\/$/, ''));
  const drawn = [...text.matchAll(/^([\w.-]+\/[\w./-]*)\s{2,}/gm)].map(([, place = '']) => place.replace(/\/$/, ''));
  const isPath = (place: string): boolean =>
    TOP.some((top) => place === top || place.startsWith(`${top}/`)) || /^[\w.-]+\.(md|json|mjs|ts)$/.test(place);
  return [...new Set([...named, ...drawn])].filter((place) => isPath(place) && !MADE_LATER.includes(place));
}

describe.each(['README.md', 'DEVELOPERS.md'])('%s', (file) => {
  it('names only what is there', () => {
    const places = pathsIn(read(file));
    expect(places.length).toBeGreaterThan(3);
    const missing = places.filter((place) => !existsSync(path.join(root, place)));
    // A bare name of a file may stand for one in the folder that the sentence is about.
    const inHouse = (place: string): boolean =>
      !place.includes('/') && existsSync(path.join(root, 'src/lib/schemas', place));
    expect(missing.filter((place) => !inHouse(place))).toEqual([]);
  });
});

describe('the settings', () => {
  it('are the same names in Astro’s environment, the example file and the README', () => {
    const declared = [...read('astro.config.mjs').matchAll(/^\s+([A-Z_]+): envField/gm)].map(([, name]) => name);
    const examples = [...read('.env.example').matchAll(/^([A-Z_]+)=/gm)].map(([, name]) => name);
    // Read by the commands and by the build, before there is a server.
    const outside = ['ALLOWED_HOSTS', 'DATABASE_OWNER_URL', 'TRUSTED_PROXIES'];
    expect(declared.length).toBeGreaterThan(4);
    expect(examples.sort()).toEqual([...declared, ...outside].sort());
    for (const name of examples) expect(read('README.md'), name).toContain(`\`${name}\``);
  });
});

describe('the repository', () => {
  it('speaks only of itself: no address of a package registry, no path of one machine', () => {
    const texts = ['README.md', 'DEVELOPERS.md', 'package.json', '.npmrc', '.ci/run', 'fixtures/README.md'];
    for (const file of texts.filter((name) => existsSync(path.join(root, name))))
      expect(read(file), file).not.toMatch(/registry\.|\/work\/|\/root\/|\/home\//);
    expect(read('package-lock.json')).not.toMatch(/"resolved": "http/);
  });
});
