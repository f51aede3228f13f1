/**
 * A plain reader of OEM in KVN, as strict as CCSDS 502.0-B-3 (2023; its rules from memory): section
 * 5.2 for the keywords, their order and which are mandatory, 7.3 to 7.5 for lines, numbers, epochs.
 */

export interface OemSegment {
  meta: Map<string, string>;
  epochs: string[];
  states: number[][];
}

export interface Oem {
  header: Map<string, string>;
  comments: string[];
  segments: OemSegment[];
}

interface Keyword {
  name: string;
  mandatory: boolean;
}
const must = (name: string): Keyword => ({ name, mandatory: true });
const may = (name: string): Keyword => ({ name, mandatory: false });

const HEADER = [
  must('CCSDS_OEM_VERS'),
  may('CLASSIFICATION'),
  must('CREATION_DATE'),
  must('ORIGINATOR'),
  may('MESSAGE_ID'),
];
const META = [
  must('OBJECT_NAME'),
  must('OBJECT_ID'),
  must('CENTER_NAME'),
  must('REF_FRAME'),
  may('REF_FRAME_EPOCH'),
  must('TIME_SYSTEM'),
  must('START_TIME'),
  may('USEABLE_START_TIME'),
  may('USEABLE_STOP_TIME'),
  must('STOP_TIME'),
  may('INTERPOLATION'),
  may('INTERPOLATION_DEGREE'),
];

const EPOCH = /^\d{4}-\d{2}-\d{2}T\d{2}:\d{2}:\d{2}(\.\d+)?Z?$/;
/** Fixed point, or a mantissa with its point in the second place. */
const NUMBER = /^[+-]?(\d+(\.\d+)?|\d\.\d+[eE][+-]?\d{1,3})$/;

function keywords(pairs: [string, string][], known: Keyword[], where: string): Map<string, string> {
  let at = -1;
  for (const [key, value] of pairs) {
    const next = known.findIndex((keyword) => keyword.name === key);
    if (next < 0) throw new Error(`${where}: unknown keyword ${key}`);
    if (next <= at) throw new Error(`${where}: ${key} out of order`);
    if (value === '') throw new Error(`${where}: ${key} has no value`);
    at = next;
  }
  const read = new Map(pairs);
  for (const { name, mandatory } of known) {
    if (mandatory && !read.has(name)) throw new Error(`${where}: ${name} is missing`);
  }
  return read;
}

function state(line: string): { epoch: string; values: number[] } {
  const [epoch, ...words] = line.trim().split(/\s+/);
  if (!EPOCH.test(epoch)) throw new Error(`not an epoch: ${epoch}`);
  if (words.length !== 6 && words.length !== 9) throw new Error(`${words.length} values: ${line}`);
  for (const word of words) {
    if (!NUMBER.test(word)) throw new Error(`not a KVN number: ${word}`);
    const digits = word.replace(/[eE].*$/, '').replace(/\D/g, '');
    if (digits.length > 16) throw new Error(`more than 16 digits: ${word}`);
  }
  return { epoch, values: words.map(Number) };
}

/** Reads an OEM; throws at the first thing the standard does not allow. */
export function readOem(text: string): Oem {
  const comments: string[] = [];
  const head: [string, string][] = [];
  const segments: OemSegment[] = [];
  let pairs: [string, string][] = head;
  let place: 'header' | 'meta' | 'data' = 'header';
  if (!text.endsWith('\n')) throw new Error('the last line is not terminated');
  for (const line of text.split('\n')) {
    if (line.length > 254) throw new Error(`a line of ${line.length} characters`);
    if (!/^[ -~]*$/.test(line)) throw new Error(`not printable ASCII: ${line}`);
    if (line.trim() === '') continue;
    if (line.startsWith('COMMENT ')) {
      comments.push(line.slice(8));
      continue;
    }
    if (line === 'META_START') {
      pairs = [];
      place = 'meta';
    } else if (line === 'META_STOP') {
      segments.push({ meta: keywords(pairs, META, 'metadata'), epochs: [], states: [] });
      place = 'data';
    } else if (place === 'data') {
      const { epoch, values } = state(line);
      segments[segments.length - 1].epochs.push(epoch);
      segments[segments.length - 1].states.push(values);
    } else {
      const at = line.indexOf('=');
      if (at < 1) throw new Error(`neither a keyword nor a state: ${line}`);
      pairs.push([line.slice(0, at).trim(), line.slice(at + 1).trim()]);
    }
  }
  if (place === 'meta') throw new Error('META_START without META_STOP');
  if (!/\S/.test(text) || !text.startsWith('CCSDS_OEM_VERS')) throw new Error('no version first');
  const header = keywords(head, HEADER, 'header');
  if (segments.length === 0) throw new Error('no segment');
  for (const segment of segments) checkTimes(segment);
  return { header, comments, segments };
}

/** Strictly rising epochs inside START_TIME and STOP_TIME, enough of them to interpolate. */
function checkTimes({ meta, epochs }: OemSegment): void {
  // One form of one length: as text they stand in the order of time.
  if (new Set(epochs.map((epoch) => epoch.length)).size > 1) throw new Error('mixed epoch forms');
  for (const [i, epoch] of epochs.entries()) {
    if (i > 0 && epoch <= epochs[i - 1]) throw new Error(`epoch ${epoch} does not rise`);
  }
  const first = meta.get('START_TIME') ?? '';
  const last = meta.get('STOP_TIME') ?? '';
  if (epochs[0] !== first || epochs[epochs.length - 1] !== last) {
    throw new Error('START_TIME and STOP_TIME are not the first and last epoch');
  }
  const degree = Number(meta.get('INTERPOLATION_DEGREE') ?? 1);
  // Hermite of degree 2n − 1 takes n states.
  const needed = meta.get('INTERPOLATION') === 'HERMITE' ? (degree + 1) / 2 : degree + 1;
  if (!Number.isInteger(needed) || epochs.length < needed) {
    throw new Error(`${epochs.length} states for interpolation of degree ${degree}`);
  }
}
