import { findEpochs } from './epoch-finder';
import { carried } from './labelled-values';
import { LABELS, type Label } from './labels';
import type { Line } from './line';
import { type NumberFormat, readToken } from './number-format';
import { problem, type RawCase } from './raw';
import type { FieldName } from './types';

/** A table: a line that names its columns, and under it the row of values. */

const STATE: readonly FieldName[] = ['x', 'y', 'z', 'vx', 'vy', 'vz'];
const SHAPE: readonly FieldName[] = ['eccentricity', 'inclination', 'node', 'argumentOfPeriapsis'];
const EPOCH_NAME = /^(?:epoch|date|calendar date|(?:M?JD)(?:TDB|TT|UTC|TAI)?)\b/i;

interface Column {
  name: string;
  label: Label | null;
  unit: string | null;
}

/** Cells of a line: parted by the most telling sign that it holds, else by blanks. */
function cellsOf(text: string, separator: string): string[] {
  const parted =
    separator === ' '
      ? text.trim().split(/\s+/)
      : text
          .trim()
          .replace(/^\||\|$/g, '')
          .split(separator);
  const cells = parted.map((cell) => cell.trim());
  while (cells.at(-1) === '') cells.pop();
  return cells;
}

const separatorOf = (text: string): string =>
  ['|', '\t', ';', ','].find((sign) => text.split(sign).length > 5) ?? ' ';

function columnOf(cell: string): Column {
  const unit = /[[(]([^\])]*)[\])]\s*$/.exec(cell);
  const name = cell
    .slice(0, unit?.index ?? cell.length)
    .replace(/[\s._]+$/, '')
    .replace(/^#/, '')
    .trim();
  const label = LABELS.find(({ pattern }) => {
    const asked = `${name} =`;
    return name !== '' && [...asked.matchAll(pattern)].some((match) => match[0] === asked);
  });
  return { name, label: label ?? null, unit: unit?.[1]?.trim() ?? null };
}

function isHeader(columns: readonly Column[]): boolean {
  const has = (field: FieldName): boolean => columns.some(({ label }) => label?.field === field);
  return STATE.every(has) || SHAPE.every(has);
}

/** Takes the row under a line of column names; what is no number of the case stays for the others. */
export function takeColumns(lines: Line[], raw: RawCase, format: NumberFormat): void {
  for (const [i, header] of lines.entries()) {
    if (header.text.length < 11 || /[=:]\s*[-+\d]/.test(header.text)) continue;
    const separator = separatorOf(header.text);
    const columns = cellsOf(header.text.replace(/^\s*[#%!*]+\s*/, ''), separator).map(columnOf);
    if (!isHeader(columns)) continue;
    const rows = lines.slice(i + 1).filter(({ text }) => {
      return /\d/.test(text) && cellsOf(text, separator).length === columns.length;
    });
    if (rows.length === 0) continue;
    if (rows.length > 1) {
      raw.problems.push(
        problem(
          'error',
          rows[1].number,
          'table',
          `${rows.length} rows`,
          'one row: one state at one epoch',
          'Leave only the row that is meant.',
        ),
      );
    }
    takeRow(rows[0], columns, cellsOf(rows[0].text, separator), raw, format);
    for (const row of rows.slice(1)) row.text = '';
    // What the header says of units and time scale is read with the other words; it is no name.
    header.text = columns
      .map(
        ({ name, label, unit }) =>
          `${label === null ? name : ''} ${unit === null ? '' : `(${unit})`}`,
      )
      .join(' ; ');
    header.original = '';
    return;
  }
}

function takeRow(
  row: Line,
  columns: readonly Column[],
  cells: readonly string[],
  raw: RawCase,
  format: NumberFormat,
): void {
  const left: string[] = [];
  for (const [i, { name, label, unit }] of columns.entries()) {
    const cell = cells[i];
    if (label === null) {
      const head = EPOCH_NAME.exec(name);
      if (head !== null)
        left.push(
          /^M?JD/i.test(name) && /^\d/.test(cell)
            ? `${name.slice(0, /^M/i.test(name) ? 3 : 2)} ${cell}`
            : cell,
        );
      else if (findEpochs(cell).length > 0) left.push(cell);
    } else if (label.kind === 'epoch' && label.field !== null) {
      raw.fields.set(label.field, { text: cell, unit: null, line: row.number, note: null });
    } else if (label.field !== null) {
      const numbers = readToken(cell, format);
      if (numbers?.length === 1) {
        raw.fields.set(label.field, {
          unit,
          line: row.number,
          ...carried(numbers[0], unit, label.field),
        });
      } else {
        raw.problems.push(problem('error', row.number, name, cell, 'a number'));
      }
    }
  }
  row.text = left.join(' ; ');
}
