import { useDeskStore } from '../store/context';
import type { DeskStore, RunState } from '../store/store';
import { useController } from './controller-context';

/** What the desk is doing, with the figure of progress; only what has settled is said aloud. */
export function RunLine() {
  const controller = useController();
  const run = useDeskStore((state) => state.run);
  const words = useDeskStore(statusInWords);
  const spoken = useDeskStore(spokenStatus);
  const isRunning = run.status === 'running';
  const canRunAgain = run.status === 'stopped' || run.status === 'failed';
  return (
    <div className="run">
      <p className="run-words">{words}</p>
      <p className="only-spoken" role="status">
        {spoken}
      </p>
      {isRunning && (
        <>
          <progress
            className="run-bar"
            max={1}
            value={run.fraction}
            aria-label="Share of the span done"
          />
          <span className="run-figure figures">{percent(run)}</span>
          <button type="button" className="button" onClick={() => controller.stop()}>
            Stop
          </button>
        </>
      )}
      {canRunAgain && (
        <button type="button" className="button" onClick={() => controller.runAgain()}>
          Run again
        </button>
      )}
    </div>
  );
}

function percent(run: RunState): string {
  return `${Math.round(run.fraction * 100)}\u2009%`;
}

function statusInWords({ run, reading, report, text }: DeskStore): string {
  switch (run.status) {
    case 'reading':
      return 'Reading the case';
    case 'running':
      return run.note === '' ? 'Assessing' : `Assessing: ${run.note}`;
    case 'done':
      return report === null ? 'Assessed' : `Assessed: ${report.case.name}`;
    case 'stopped':
      return `Stopped at ${percent(run)}`;
    case 'failed':
      return 'Could not be done: see the findings';
    case 'idle':
      break;
  }
  if (text.trim() === '' || reading === null) return 'Waiting for a case';
  const errors = reading.problems.filter((problem) => problem.severity === 'error').length;
  if (errors > 0) return `${count(errors, 'problem')} in the case`;
  if (reading.questions.length > 0) {
    return `${count(reading.questions.length, 'question')} about the case`;
  }
  return 'The case is not complete';
}

/** Not every keystroke's reading and not every step: the outcome, with the answer. */
function spokenStatus(state: DeskStore): string {
  const { run, report } = state;
  if (run.status === 'reading') return '';
  if (run.status === 'running') return 'Assessing';
  const answer = report?.findings.find((finding) => finding.kind === 'answer');
  if (run.status === 'done' && answer !== undefined) return `Assessed. ${answer.text}`;
  return statusInWords(state);
}

function count(n: number, word: string): string {
  return `${n} ${word}${n === 1 ? '' : 's'}`;
}
