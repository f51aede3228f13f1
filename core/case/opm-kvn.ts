import type { Entry } from './opm';
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
    const comment = /^COMMENT\b\s*=?\s*(.*)$/.exec(content);
    if (comment !== null) {
      entries.push({ key: 'COMMENT', value: comment[1], unit: null, line });
      continue;
    }
    const match = /^([A-Za-z][A-Za-z0-9_]*)\s*=\s*(.*?)\s*(?:\[([^\]]*)\])?$/.exec(content);
    if (match === null) {
      problems.push(problem('error', line, 'OPM', content, 'a line of the form KEYWORD = value'));
      continue;
    }
    entries.push({
      key: match[1].toUpperCase(),
      value: match[2],
      unit: match[3]?.trim() ?? null,
      line,
    });
  }
  return { entries, problems };
}
