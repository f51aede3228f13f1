import type { Finding, Report } from '../../../core/report/report';
import { useDeskStore } from '../../store/context';
import { EstimateLine, EstimateNote } from '../EstimateLine';
import { ApproachesTable } from './ApproachesTable';
import { Caution } from './Caution';
import { CrossingsTable } from './CrossingsTable';
import { EntryTable } from './EntryTable';
import { FindingItem } from './FindingItem';
import { HandOver } from './HandOver';
import { ModelFold } from './ModelFold';
import './findings.css';

/** Right: what was found, what it rests on, and what can be handed over. */
export function Findings() {
  const report = useDeskStore((state) => state.report);
  return (
    <section id="findings" className="findings" aria-labelledby="findings-title" tabIndex={-1}>
      <header className="findings-head">
        <h2 id="findings-title" className="caps">
          Findings
        </h2>
        <EstimateNote />
      </header>
      <EstimateLine />
      <div className="findings-body">
        <Failure />
        {report === null ? <Nothing /> : <Found report={report} />}
      </div>
      <HandOver />
    </section>
  );
}

function Nothing() {
  const status = useDeskStore((state) => state.run.status);
  if (status === 'failed') return null;
  return (
    <p className="soft">
      {status === 'running' || status === 'reading'
        ? 'The findings stand here as soon as the case has been assessed.'
        : 'No case has been assessed yet. Paste one into the case sheet, or pick an invented one.'}
    </p>
  );
}

function Failure() {
  const run = useDeskStore((state) => state.run);
  if (run.status !== 'failed') return null;
  return (
    <div className="findings-failure" role="alert">
      <p className="caps">Could not be done</p>
      <p>{run.error}</p>
    </div>
  );
}

function Found({ report }: { report: Report }) {
  const isStale = useDeskStore((state) => state.reportIsStale);
  const of = (kind: Finding['kind']) =>
    report.findings
      .filter((finding) => finding.kind === kind)
      .map((finding) => <FindingItem key={finding.id} finding={finding} />);
  const principal = report.principal === null ? null : report.approaches[report.principal];
  return (
    <>
      {isStale && (
        <p className="findings-stale">
          <span className="caps">Of the case before</span> The text has changed since; what follows
          belongs to {report.case.name}.
        </p>
      )}
      <div className={isStale ? 'findings-all findings-old' : 'findings-all'}>
        <p className="findings-object">
          {report.case.name}
          {report.case.objectId !== null && report.case.objectId !== report.case.name && (
            <span className="soft"> · {report.case.objectId}</span>
          )}
        </p>
        <ul className="findings-list">{of('answer')}</ul>
        <Cautions report={report} />
        <ul className="findings-list">{of('support')}</ul>
        <ul className="findings-list">{of('caution')}</ul>
        <ApproachesTable report={report} />
        {principal !== null && <CrossingsTable approach={principal} />}
        {principal?.entry !== undefined && <EntryTable entry={principal.entry} />}
        <ModelFold report={report} />
      </div>
    </>
  );
}

/** Cautions of the report that no finding carries already. */
function Cautions({ report }: { report: Report }) {
  const carried = report.findings.flatMap(({ text, caution }) => [text, caution]);
  const own = report.cautions.filter((caution) => !carried.includes(caution));
  if (own.length === 0) return null;
  return (
    <ul className="findings-list">
      {own.map((caution) => (
        <li key={caution} className="finding">
          <Caution text={caution} />
        </li>
      ))}
    </ul>
  );
}
