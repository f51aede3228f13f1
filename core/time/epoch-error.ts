export type EpochErrorCode =
  | 'year'
  | 'month'
  | 'day'
  | 'day-of-year'
  | 'hour'
  | 'minute'
  | 'second'
  | 'leap-second'
  | 'number'
  | 'scale'
  | 'time-zone'
  | 'ambiguous-date'
  | 'unreadable'
  | 'not-an-instant'
  | 'out-of-range';

/** An epoch that cannot be read or converted: says what was read and what was expected. */
export class EpochError extends Error {
  readonly code: EpochErrorCode;
  readonly read: string;
  readonly expected: string;
  /** For `ambiguous-date`: the possible readings, each a text that reads in one way only. */
  readonly readings: readonly string[];

  constructor(
    code: EpochErrorCode,
    read: string,
    expected: string,
    readings: readonly string[] = [],
  ) {
    super(`read ${read}; expected ${expected}`);
    this.name = 'EpochError';
    this.code = code;
    this.read = read;
    this.expected = expected;
    this.readings = readings;
  }
}
