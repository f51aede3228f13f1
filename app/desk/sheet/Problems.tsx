import type { Problem } from '../../../core/case/types';

const WORDS = { error: 'Error', warning: 'Doubt', note: 'Note' } as const;

interface Props {
  problems: Problem[];
  onSelect(line: number): void;
}

/** What is wrong or worth knowing, each with its line; choosing it selects the line. */
export function Problems({ problems, onSelect }: Props) {
  if (problems.length === 0) return null;
  return (
    <section aria-labelledby="problems-title">
      <h3 id="problems-title" className="caps">
        Beside the lines
      </h3>
      <ul className="problems">
        {problems.map((problem) => (
          <li
            key={`${problem.severity} ${problem.line} ${problem.field} ${problem.message}`}
            className={`problem problem-${problem.severity}`}
          >
            <p className="problem-head">
              <span className="caps">{WORDS[problem.severity]}</span>
              <Place problem={problem} onSelect={onSelect} />
            </p>
            <p>{problem.message}</p>
          </li>
        ))}
      </ul>
    </section>
  );
}

function Place({ problem, onSelect }: { problem: Problem; onSelect(line: number): void }) {
  const { line, field } = problem;
  if (line === null) return <span>{field}</span>;
  return (
    <button type="button" className="link" onClick={() => onSelect(line)}>
      line {line}
      {field === '' ? '' : ` · ${field}`}
    </button>
  );
}
