import { spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { DEMOS } from '../../app/desk/demos';

const ROOT = resolve(import.meta.dirname, '../..');
const folder = mkdtempSync(join(tmpdir(), 'skimline-cli-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

/** The command line as a person runs it, without npm in between. */
function assess(input: string, ...words: string[]) {
  return spawnSync(process.execPath, ['--import', 'tsx', 'core/cli.ts', ...words], {
    cwd: ROOT,
    input,
    encoding: 'utf8',
  });
}

describe('the command line', () => {
  it('writes a report on standard output and nothing else', () => {
    const run = assess(DEMOS[0].text);
    expect([run.status, run.stderr]).toEqual([0, '']);
    const report = JSON.parse(run.stdout);
    expect(report.format).toBe('skimline-report');
    expect(report.model.gmSet).toBe('DE431');
    expect(report.approaches.length).toBeGreaterThan(0);
  });

  it('takes the set of masses and the span', () => {
    const run = assess(
      DEMOS[0].text,
      '--gm',
      'DE405',
      '--from',
      '2031-04-01',
      '--to',
      '2031-06-01',
      '--clones',
      '0',
    );
    const report = JSON.parse(run.stdout);
    expect(report.model.gmSet).toBe('DE405');
    expect(report.model.span.fromJdTdb).toBe(2462957.5);
    expect(report.model.span.toJdTdb).toBe(2463018.5);
    for (const approach of report.approaches) {
      expect(approach.jdTdb).toBeGreaterThanOrEqual(2462957.5);
      expect(approach.jdTdb).toBeLessThanOrEqual(2463018.5);
    }
  });

  it('ends with exit code 2, words on standard error and nothing on standard output', () => {
    const bad = [
      assess(''),
      assess('no orbit at all'),
      assess(DEMOS[0].text.replace('X_DOT = -17.3', 'X_DOT = -1700.3')),
      assess(DEMOS[0].text, '--gm', 'DE999'),
      assess(DEMOS[0].text, '--no-such-option'),
      assess(DEMOS[0].text, '--set', 'nothing=1'),
    ];
    for (const run of bad) {
      expect(run.status).toBe(2);
      expect(run.stdout).toBe('');
      expect(run.stderr.trim()).not.toBe('');
      expect(run.stderr).not.toMatch(/\n\s+at /);
    }
  });

  it('writes the OEM and the CSV where it is told to', () => {
    const oem = join(folder, 'out.oem');
    const csv = join(folder, 'out.csv');
    const run = assess(DEMOS[3].text, '--oem', oem, '--csv', csv);
    expect(run.status).toBe(0);
    expect(readFileSync(oem, 'utf8')).toMatch(/^CCSDS_OEM_VERS = 3\.0/);
    expect(readFileSync(csv, 'utf8')).toMatch(/^jdTdb,/);
  });

  it('carries the clones it is told to, and gives the same report for the same seed', () => {
    const may = DEMOS.find(({ id }) => id === 'may-hit')?.text ?? '';
    const words = ['--to', '2031-05-20', '--made-at', '2030-01-01T00:00:00Z', '--clones', '1000'];
    const geojson = join(folder, 'corridor.geojson');
    const one = assess(may, ...words, '--seed', '7', '--geojson', geojson);
    expect([one.status, one.stderr]).toEqual([0, '']);
    const { ensemble, seed, adopted } = JSON.parse(one.stdout).impactProbability;
    expect([ensemble.count, seed]).toEqual([1000, 7]);
    expect(adopted.value).toBeGreaterThan(0);
    expect(JSON.parse(readFileSync(geojson, 'utf8')).type).toBe('FeatureCollection');
    expect(assess(may, ...words, '--seed', '7').stdout).toBe(one.stdout);
    const other = JSON.parse(assess(may, ...words, '--seed', '8').stdout);
    expect(other.fingerprint).not.toBe(JSON.parse(one.stdout).fingerprint);
    const none = JSON.parse(assess(may, ...words.slice(0, 4), '--clones', '0').stdout);
    expect(none.impactProbability).toBeUndefined();
  });

  it('refuses a number of clones or a seed that is none, and a corridor where there is none', () => {
    for (const words of [
      ['--clones', '1000001'],
      ['--clones', '-5'],
      ['--seed', 'x'],
      ['--geojson', join(folder, 'none.geojson'), '--clones', '0'],
    ]) {
      const run = assess(DEMOS[0].text, ...words);
      expect([run.status, run.stdout]).toEqual([2, '']);
      expect(run.stderr).toContain(words[0]);
    }
  });
});
