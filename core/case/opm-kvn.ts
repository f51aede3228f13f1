import type { Entry } from './opm-keywords';
import { problem } from './raw';
import type { Problem } from './types';

/** KVN lines of a CCSDS message: KEYWORD = value [unit], COMMENT text. */
export function readKvn(text: string): { entries: Entry[]; problems: Problem[] } {
  const entries: Entry[] = [];
  const problems: Problem[] = [];
  for (const [i, source] of text.split(/\r\n|\r|\n/).entries()) {
    const line = i + 1;
    const content = source.trim();
    if (content === '' || content.startsWith('#')) continue;
    const comment = /^COMMENT\b\s*=?(.*)$/.exec(content);
    if (comment !== null) {
      entries.push({ key: 'COMMENT', value: comment[1].trim(), unit: null, line });
      continue;
    }
    const match = /^([A-Za-z][A-Za-z0-9_]*)\s*=(.*)$/.exec(content);
    if (match === null) {
      problems.push(problem('error', line, 'OPM', content, 'a line of the form KEYWORD = value'));
      continue;
    }
    entries.push({ key: match[1].toUpperCase(), ...valueAndUnit(match[2].trim()), line });
  }
  return { entries, problems };
}

/** "12.5 [km]": searched from the end, since a pattern would try every bracket. */
function valueAndUnit(text: string): { value: string; unit: string | null } {
  const at = text.endsWith(']') ? text.lastIndexOf('[') : -1;
  if (at < 0) return { value: text, unit: null };
  return { value: text.slice(0, at).trim(), unit: text.slice(at + 1, -1).trim() };
}
