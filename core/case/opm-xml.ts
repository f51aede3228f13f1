import { SaxesParser } from 'saxes';
import type { Entry } from './opm-keywords';
import { problem } from './raw';
import type { Problem } from './types';

/** Elements of an OPM in XML (CCSDS 505.0-B): leaf elements are the keywords of the KVN form. */
export function readXml(text: string): { entries: Entry[]; problems: Problem[] } {
  const entries: Entry[] = [];
  const problems: Problem[] = [];
  const parser = new SaxesParser<{ position: true; xmlns: false }>({
    position: true,
    xmlns: false,
  });
  const open: {
    name: string;
    line: number;
    unit: string | null;
    text: string;
    leaf: boolean;
    parameter: string | null;
  }[] = [];
  let failed = false;
  let isOpm = false;
  parser.on('error', (error) => {
    if (failed) return;
    failed = true;
    problems.push(
      problem(
        'error',
        parser.line,
        'XML',
        error.message.replace(/^\d+:\d+:\s*/, ''),
        'well-formed XML of an OPM',
      ),
    );
  });
  parser.on('opentag', (tag) => {
    const parent = open.at(-1);
    if (parent !== undefined) parent.leaf = false;
    const name = tag.name.replace(/^.*:/, '');
    if (name === 'opm') {
      isOpm = true;
      const version = tag.attributes.version;
      if (version !== undefined) {
        entries.push({ key: 'CCSDS_OPM_VERS', value: version, unit: null, line: parser.line });
      }
    }
    open.push({
      name,
      line: parser.line,
      unit: tag.attributes.units ?? null,
      text: '',
      leaf: true,
      parameter: tag.attributes.parameter ?? null,
    });
  });
  parser.on('text', (part) => {
    const top = open.at(-1);
    if (top !== undefined) top.text += part;
  });
  parser.on('closetag', () => {
    const top = open.pop();
    if (top === undefined || !top.leaf || failed) return;
    const value = top.text.trim();
    if (top.name === 'USER_DEFINED' && top.parameter !== null) {
      entries.push({ key: `USER_DEFINED_${top.parameter}`, value, unit: null, line: top.line });
    } else if (/^[A-Z]/.test(top.name)) {
      entries.push({ key: top.name, value, unit: top.unit, line: top.line });
    }
  });
  try {
    parser.write(text).close();
  } catch {
    // The parser has told of what it throws for.
  }
  if (!failed && !isOpm) {
    problems.push(
      problem('error', 1, 'XML', open[0]?.name ?? text.trim().slice(0, 40), 'an <opm> message'),
    );
  }
  return { entries, problems };
}
