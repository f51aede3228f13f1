import { Ribbon } from '../ribbon/Ribbon';
import { useDeskStore } from '../store/context';
import { DropPlace } from './DropPlace';
import { Findings } from './findings/Findings';
import { Header } from './Header';
import { StagePlace } from './StagePlace';
import { CaseSheet } from './sheet/CaseSheet';
import './desk.css';

const PARTS = [
  ['sheet', 'the case sheet'],
  ['stage', 'the stage'],
  ['findings', 'the findings'],
  ['ribbon', 'the range ribbon'],
] as const;

/** The page's frame: header, case sheet, stage, findings, ribbon. */
export function Desk() {
  const sheetOpen = useDeskStore((state) => state.sheetOpen);
  return (
    <>
      <nav className="skip" aria-label="Parts of the desk">
        {PARTS.map(([id, words]) => (
          <a key={id} href={`#${id}`}>
            Skip to {words}
          </a>
        ))}
      </nav>
      <div className={sheetOpen ? 'desk' : 'desk desk-sheet-folded'}>
        <Header />
        <main className="desk-parts">
          <CaseSheet />
          <StagePlace />
          <Findings />
          <section id="ribbon" className="ribbon-place" aria-label="Range ribbon" tabIndex={-1}>
            <Ribbon />
          </section>
        </main>
      </div>
      <DropPlace />
    </>
  );
}
