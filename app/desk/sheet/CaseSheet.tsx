import { type ChangeEvent, useCallback, useRef } from 'react';
import { useDesk, useDeskStore } from '../../store/context';
import { useController } from '../controller-context';
import { DEMOS } from '../demos';
import { Fields } from './Fields';
import { type LinePointer, PasteArea } from './PasteArea';
import { Problems } from './Problems';
import { Questions } from './Questions';
import './sheet.css';

/** Left: the pasted text, what is wrong with it, and the case as understood. */
export function CaseSheet() {
  const { store } = useDesk();
  const open = useDeskStore((state) => state.sheetOpen);
  const toggle = () => store.setState({ sheetOpen: !open });
  return (
    <section id="sheet" className="sheet" aria-labelledby="sheet-title" tabIndex={-1}>
      <header className="sheet-head">
        <h2 id="sheet-title" className={open ? 'caps' : 'only-spoken'}>
          Case sheet
        </h2>
        <button
          type="button"
          className="link sheet-fold"
          aria-label={open ? 'Fold away the case sheet' : 'Case sheet, unfold it'}
          aria-expanded={open}
          aria-controls="sheet-body"
          onClick={toggle}
        >
          {open ? 'Fold away' : 'Case sheet'}
        </button>
      </header>
      <div id="sheet-body" className="sheet-body" hidden={!open}>
        <SheetBody />
      </div>
    </section>
  );
}

function SheetBody() {
  const controller = useController();
  const reading = useDeskStore((state) => state.reading);
  const isEmpty = useDeskStore((state) => state.text.trim() === '');
  const pointer = useRef<LinePointer | null>(null);
  const keepPointer = useCallback((next: LinePointer) => {
    pointer.current = next;
  }, []);
  const select = useCallback((line: number) => pointer.current?.select(line), []);
  return (
    <>
      <Demos />
      <div>
        <PasteArea onReady={keepPointer} />
        <div className="sheet-tools">
          <OpenFile />
          <button
            type="button"
            className="button"
            disabled={isEmpty}
            onClick={() => controller.setText('', 'replaced')}
          >
            Clear
          </button>
          {reading?.format != null && (
            <span className="sheet-format">read as {FORMATS[reading.format]}</span>
          )}
        </div>
        <p id="paste-hint" className="sheet-hint">
          A state vector or elements in free text, a CCSDS OPM (KVN or XML), or a case file; pasted,
          typed or dropped anywhere on the page.
        </p>
      </div>
      {reading !== null && (
        <>
          <Questions questions={reading.questions} onSelect={select} />
          <Problems problems={reading.problems} onSelect={select} />
          <Fields fields={reading.fields} onSelect={select} />
        </>
      )}
    </>
  );
}

const FORMATS = {
  'opm-kvn': 'CCSDS OPM (KVN)',
  'opm-xml': 'CCSDS OPM (XML)',
  'free-text': 'free text, a state',
  'elements-text': 'free text, elements',
  'case-file': 'a case file',
} as const;

function OpenFile() {
  const controller = useController();
  const input = useRef<HTMLInputElement>(null);
  function opened(event: ChangeEvent<HTMLInputElement>) {
    const file = event.target.files?.[0];
    if (file !== undefined) void controller.openFile(file);
    event.target.value = '';
  }
  return (
    <>
      <button type="button" className="button" onClick={() => input.current?.click()}>
        Open…
      </button>
      <input ref={input} type="file" hidden onChange={opened} aria-label="File of a case" />
    </>
  );
}

function Demos() {
  const controller = useController();
  const text = useDeskStore((state) => state.text);
  return (
    <details className="fold demos">
      <summary>Invented cases to look at</summary>
      <ul>
        {DEMOS.map((demo) => (
          <li key={demo.id}>
            <button
              type="button"
              className="demo"
              aria-pressed={demo.text === text}
              onClick={() => controller.setText(demo.text, 'replaced')}
            >
              <span className="demo-title">{demo.title}</span>
              <span className="demo-note">{demo.note}</span>
            </button>
          </li>
        ))}
      </ul>
    </details>
  );
}
