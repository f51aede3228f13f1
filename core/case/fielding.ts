import { EpochError, type EpochReading, readEpochText } from '../time/read';
import { plainNumber, problem, type Raw, type RawCase, remark, tidyNumber } from './raw';
import type { Choices, Field, FieldName, FieldOrigin, Problem, Question } from './types';
import { known, lookUp, type Word } from './vocabulary';

/**
 * Turns raw fields into fields as understood, one after another, collecting what is wrong.
 *
 * What was set by hand stands over what the text says; what neither says may be assumed, in the open.
 */
export class Fielding {
  readonly fields: Field[] = [];
  readonly problems: Problem[];
  readonly questions: Question[];
  private readonly values: Map<FieldName, Raw>;
  private readonly edited = new Set<FieldName>();

  constructor(source: RawCase, choices: Choices) {
    this.problems = [...source.problems];
    this.values = new Map(source.fields);
    for (const [name, text] of Object.entries(choices)) {
      if (text === undefined) continue;
      const field = name as FieldName;
      this.values.set(field, { text, unit: null, line: null, note: null });
      this.edited.add(field);
    }
    // A question that was answered by hand is one no longer.
    this.questions = source.questions.filter((question) => !this.edited.has(question.field));
  }

  has(field: FieldName): boolean {
    return (this.values.get(field)?.text.trim() ?? '') !== '';
  }

  isEdited(field: FieldName): boolean {
    return this.edited.has(field);
  }

  raw(field: FieldName): Raw | null {
    return this.values.get(field) ?? null;
  }

  textOf(field: FieldName): string | null {
    return this.has(field) ? (this.values.get(field)?.text.trim() ?? null) : null;
  }

  /** Records what another field implied. */
  set(field: FieldName, text: string, line: number | null, note: string | null = null): void {
    this.values.set(field, { text, unit: null, line, note });
  }

  private originOf(field: FieldName): FieldOrigin {
    if (this.edited.has(field)) return 'edited';
    return this.values.has(field) ? 'read' : 'assumed';
  }

  /** Adds a field to what is shown; without a raw value it counts as assumed. */
  show(
    field: FieldName,
    label: string,
    value: string,
    unit: string | null,
    note: string | null = null,
    options: Field['options'] = null,
  ): void {
    const raw = this.values.get(field);
    this.fields.push({
      field,
      label,
      value,
      unit,
      origin: this.originOf(field),
      line: this.edited.has(field) ? null : (raw?.line ?? null),
      options,
      note: raw?.note ?? note,
    });
  }

  /** A field of plain words. */
  words(field: FieldName, label: string, assumed: string | null, why: string | null): void {
    if (this.has(field)) this.show(field, label, this.textOf(field) ?? '', null);
    else if (assumed !== null) this.show(field, label, assumed, null, why);
  }

  /** One of the words of a list; what the text does not say is assumed in the open. */
  choose<T extends string>(
    field: FieldName,
    label: string,
    words: readonly Word<T>[],
    assumed: T,
    why: string,
  ): T | null {
    const options = words.map(({ value, label: shown }) => ({ value, label: shown }));
    const raw = this.raw(field);
    if (raw === null || raw.text.trim() === '') {
      this.values.delete(field);
      this.edited.delete(field);
      this.show(field, label, assumed, null, why, options);
      return assumed;
    }
    const word = lookUp(words, raw.text);
    if (word === null) {
      this.show(field, label, raw.text, null, null, options);
      this.problems.push(problem('error', raw.line, label, raw.text, `one of ${known(words)}`));
      return null;
    }
    this.show(field, label, word.value, null, null, options);
    return word.value;
  }

  /** A number; null with a problem when it is missing or is none. */
  number(
    field: FieldName,
    label: string,
    unit: string | null,
    { optional = false, from = -1e300, to = 1e300 } = {},
  ): number | null {
    const raw = this.raw(field);
    if (raw === null || raw.text.trim() === '') {
      if (!optional) {
        this.problems.push(problem('error', null, label, '', `a number${inUnit(unit)}`));
      }
      return null;
    }
    this.show(field, label, tidyNumber(raw.text), unit);
    const value = plainNumber(raw.text);
    if (value === null) {
      this.problems.push(problem('error', raw.line, label, raw.text, `a number${inUnit(unit)}`));
      return null;
    }
    if (value < from || value > to) {
      this.problems.push(
        problem(
          'error',
          raw.line,
          label,
          raw.text,
          `a number from ${from} to ${to}${inUnit(unit)}`,
        ),
      );
      return null;
    }
    return value;
  }

  /** An instant; null with a problem or, for a date with two readings, a question. */
  epochReading(field: FieldName, raw: Raw): EpochReading | null {
    try {
      const reading = readEpochText(raw.text);
      if (reading !== null) return reading;
      this.problems.push(
        problem(
          'error',
          raw.line,
          field === 'epoch' ? 'epoch' : field,
          raw.text,
          'an instant such as 2031-05-12T00:00:00, 2031 May 12.5, JD 2463000.5 or MJD 63000',
        ),
      );
    } catch (error) {
      if (!(error instanceof EpochError)) throw error;
      if (error.readings.length > 1) {
        this.questions.push({
          field,
          line: raw.line,
          message: `“${raw.text.trim()}” can be read as two dates. Which is meant?`,
          readings: error.readings.map((text) => ({ value: text, label: text })),
        });
        return null;
      }
      this.problems.push(
        problem('error', raw.line, field === 'epoch' ? 'epoch' : field, error.read, error.expected),
      );
    }
    return null;
  }

  note(line: number | null, field: string, read: string, message: string): void {
    this.problems.push(remark('note', line, field, read, message));
  }
}

const inUnit = (unit: string | null): string => (unit === null ? '' : ` (${unit})`);
