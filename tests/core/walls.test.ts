import { readdirSync, readFileSync } from 'node:fs';
import { dirname, join, relative, resolve } from 'node:path';
import { describe, expect, it } from 'vitest';

/** The walls of the house: who may import whom. */

const ROOT = resolve(import.meta.dirname, '../..');

/** Rooms of the core, from the bottom up: a room imports only rooms before it, and itself. */
const ROOMS = [
  'constants',
  'math',
  'time',
  'frames',
  'ephemeris',
  'orbit',
  'dynamics',
  'encounter',
  'uncertainty',
  'entry',
  'sky',
  'case',
];
const NODE_ONLY = ['core/cli.ts', 'core/ephemeris/pack.ts'];

interface Import {
  file: string;
  /** Path from the root for a relative import, the bare specifier otherwise. */
  target: string;
  relative: boolean;
  typeOnly: boolean;
}

function sources(folder: string): string[] {
  return readdirSync(join(ROOT, folder), { recursive: true, encoding: 'utf8' })
    .filter((name) => /\.tsx?$/.test(name))
    .map((name) => join(folder, name));
}

/** Imports of a source text; a statement whose names are all `type` counts as type-only. */
function importsOf(file: string, text: string): Import[] {
  const found: Import[] = [];
  const pattern =
    /(?:import|export)\s+(type\s+)?((?:[\w*{}\s,$]|\bas\b)*?)\s*from\s*['"]([^'"]+)['"]|import\(\s*['"]([^'"]+)['"]\s*\)|import\s+['"]([^'"]+)['"]/g;
  for (const match of text.matchAll(pattern)) {
    const specifier = match[3] ?? match[4] ?? match[5];
    const names = (match[2] ?? '')
      .replace(/[{}]/g, '')
      .split(',')
      .map((name) => name.trim());
    const inner = names.filter((name) => name !== '');
    const typeOnly =
      match[1] !== undefined || (inner.length > 0 && inner.every((name) => /^type\s/.test(name)));
    const isRelative = specifier.startsWith('.');
    const target = isRelative
      ? relative(ROOT, resolve(ROOT, dirname(file), specifier)).replace(/\.tsx?$/, '')
      : specifier;
    found.push({ file, target, relative: isRelative, typeOnly });
  }
  return found;
}

const all = (folder: string): Import[] =>
  sources(folder).flatMap((file) => importsOf(file, readFileSync(join(ROOT, file), 'utf8')));

const words = (found: Import[]): string[] => found.map((item) => `${item.file} -> ${item.target}`);

describe('the reader of imports', () => {
  it('sees static, type-only, re-exported, bare and dynamic imports', () => {
    const found = importsOf(
      'core/a/b.ts',
      "import { x } from '../c/d';\nimport type { Y } from './e';\nexport { z } from 'three';\nimport { type A, type B } from '../f';\nconst g = import('../h');\nimport './i.css';",
    );
    expect(found.map((item) => [item.target, item.typeOnly])).toEqual([
      ['core/c/d', false],
      ['core/a/e', true],
      ['three', false],
      ['core/f', true],
      ['core/h', false],
      ['core/a/i.css', false],
    ]);
  });
});

describe('the core', () => {
  const core = all('core');

  it('imports nothing of the page, of the tests, of React, three or zustand', () => {
    const outside = core.filter(
      (item) =>
        /^(app|tests)\//.test(item.target) ||
        /^(react|three|zustand|@react-three)/.test(item.target),
    );
    expect(words(outside)).toEqual([]);
  });

  it('touches Node only at the command line and the packer', () => {
    const node = core.filter((item) => item.target.startsWith('node:'));
    expect(words(node.filter((item) => !NODE_ONLY.includes(item.file)))).toEqual([]);
  });

  it('reads no clock, no chance and no console outside the command line', () => {
    const guilty = sources('core')
      .filter((file) => !NODE_ONLY.includes(file))
      .filter((file) =>
        /Date\.now|new Date\(|Math\.random|console\./.test(readFileSync(join(ROOT, file), 'utf8')),
      );
    expect(guilty).toEqual([]);
  });

  it('has rooms that import only rooms below them', () => {
    const roomOf = (path: string): number => ROOMS.indexOf(path.split('/')[1].replace(/\.ts$/, ''));
    const upward = core.filter((item) => {
      if (!item.relative || !item.target.startsWith('core/')) return false;
      const from = roomOf(item.file);
      if (from < 0) return false;
      const to = roomOf(item.target);
      return to < 0 || to > from;
    });
    expect(words(upward)).toEqual([]);
  });
});

describe('the page', () => {
  const app = all('app');

  it('touches functions of the core only in app/worker', () => {
    const touching = app.filter(
      (item) =>
        item.target.startsWith('core/') && !item.typeOnly && !item.file.startsWith('app/worker/'),
    );
    expect(words(touching)).toEqual([]);
  });

  it('keeps three out of the desk, the charts, the ribbon and the plate', () => {
    const three = app.filter(
      (item) => /^(three|@react-three)/.test(item.target) && !item.file.startsWith('app/stage/'),
    );
    expect(words(three)).toEqual([]);
  });

  it('keeps stage and charts apart', () => {
    const across = app.filter(
      (item) =>
        (item.file.startsWith('app/stage/') && item.target.startsWith('app/charts')) ||
        (item.file.startsWith('app/charts/') && item.target.startsWith('app/stage')),
    );
    expect(words(across)).toEqual([]);
  });

  it('imports nothing of the tests', () => {
    expect(words(app.filter((item) => item.target.startsWith('tests/')))).toEqual([]);
  });
});
