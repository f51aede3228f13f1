import { type ClipboardEvent, useEffect, useRef } from 'react';
import type { Problem, ReadResult } from '../../../core/case/types';
import { useDeskStore } from '../../store/context';
import { useController } from '../controller-context';
import { DEMOS } from '../demos';

/** What the sheet can ask of the paste area: lay the selection on a line (1-based). */
export interface LinePointer {
  select(line: number): void;
}

type Mark = Problem['severity'] | 'question';

const SIGNS: Record<Mark, string> = { error: '✕', question: '?', warning: '△', note: '·' };
const RANK: Record<Mark, number> = { error: 3, question: 2, warning: 1, note: 0 };

/** As in sheet.css. */
const LINE_HEIGHT_PX = 18;

const topOf = (line: number): number => (line - 1) * LINE_HEIGHT_PX;

function numbersTo(lines: number): string {
  return Array.from({ length: lines }, (_, index) => index + 1).join('\n');
}

/** The gravest mark of each line. */
function marksOf(reading: ReadResult | null): Map<number, Mark> {
  const marks = new Map<number, Mark>();
  const put = (line: number | null, mark: Mark) => {
    if (line === null) return;
    const known = marks.get(line);
    if (known === undefined || RANK[mark] > RANK[known]) marks.set(line, mark);
  };
  for (const { line, severity } of reading?.problems ?? []) put(line, severity);
  for (const { line } of reading?.questions ?? []) put(line, 'question');
  return marks;
}

/** The big paste area with its lines numbered and the problems marked beside them. */
export function PasteArea({ onReady }: { onReady(pointer: LinePointer): void }) {
  const controller = useController();
  const text = useDeskStore((state) => state.text);
  const reading = useDeskStore((state) => state.reading);
  const area = useRef<HTMLTextAreaElement>(null);
  const gutter = useRef<HTMLDivElement>(null);
  const pastedWhole = useRef(false);
  const lines = text.split('\n').length;
  const marks = marksOf(reading);

  useEffect(() => {
    onReady({
      select(line) {
        const element = area.current;
        if (element === null) return;
        const before = element.value
          .split('\n')
          .slice(0, line - 1)
          .join('\n').length;
        const start = line === 1 ? 0 : before + 1;
        const end = element.value.indexOf('\n', start);
        element.focus();
        element.setSelectionRange(start, end === -1 ? element.value.length : end);
        element.scrollTop = topOf(line) - element.clientHeight / 2;
      },
    });
  }, [onReady]);

  /** A paste over everything, or into a demo nobody has touched, is a new case as a whole. */
  function paste(event: ClipboardEvent<HTMLTextAreaElement>) {
    const element = event.currentTarget;
    const all = element.selectionStart === 0 && element.selectionEnd === element.value.length;
    const untouchedDemo = DEMOS.some((demo) => demo.text === element.value);
    if (untouchedDemo && !all) {
      event.preventDefault();
      controller.setText(event.clipboardData.getData('text'), 'replaced');
    } else {
      pastedWhole.current = all;
    }
  }

  return (
    <div className="paste">
      <div className="paste-gutter" aria-hidden="true">
        <div ref={gutter} className="paste-lines">
          <div className="paste-numbers">{numbersTo(lines)}</div>
          {[...marks].map(([line, mark]) => (
            <span key={line} className={`paste-mark paste-${mark}`} style={{ top: topOf(line) }}>
              {SIGNS[mark]} {line}
            </span>
          ))}
        </div>
      </div>
      <textarea
        ref={area}
        className="paste-text figures"
        aria-label="The case: paste or type a state, elements, a CCSDS OPM or a case file"
        aria-describedby="paste-hint"
        aria-invalid={reading?.problems.some((problem) => problem.severity === 'error') ?? false}
        spellCheck={false}
        autoComplete="off"
        autoCapitalize="off"
        wrap="off"
        rows={11}
        value={text}
        onPaste={paste}
        onChange={(event) => {
          controller.setText(event.target.value, pastedWhole.current ? 'replaced' : 'typed');
          // The caret stands at the end of what was pasted; the lines are read from their start.
          const area = event.target;
          if (pastedWhole.current) requestAnimationFrame(() => area.scrollTo(0, 0));
          pastedWhole.current = false;
        }}
        onScroll={(event) => {
          const { scrollTop } = event.currentTarget;
          if (gutter.current !== null) {
            gutter.current.style.transform = `translateY(${-scrollTop}px)`;
          }
        }}
      />
    </div>
  );
}
