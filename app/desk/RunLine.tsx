import { useDeskStore } from '../store/context';
import type { DeskStore, RunState } from '../store/store';
import { useController } from './controller-context';

/** What the desk is doing: said aloud when it changes; the figure of progress is shown beside it. */
export function RunLine() {
  const controller = useController();
  const run = useDeskStore((state) => state.run);
  const words = useDeskStore(statusInWords);
  const isRunning = run.status === 'running';
  const canRunAgain = run.status === 'stopped' || run.status === 'failed';
  return (
    <div className="run">
      <p className="run-words" role="status">
        {words}
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
      return 'The assessment could not be finished';
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

function count(n: number, word: string): string {
  return `${n} ${word}${n === 1 ? '' : 's'}`;
}
