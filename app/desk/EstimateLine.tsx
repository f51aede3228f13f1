import { useState } from 'react';
import { useDeskStore } from '../store/context';
import type { EstimateState } from '../store/store';
import { ESTIMATE_SEED } from './controller';
import { useController } from './controller-context';
import { grouped, percentage, unbroken } from './figures';
import './estimate-line.css';

/** Numbers of clones that can be asked for. */
const CHOICES = [1_000, 10_000, 100_000, 1_000_000];

/** How many clones of the uncertain orbit have been carried, how many of them hit, and how to go on. */
export function EstimateLine() {
  const controller = useController();
  const estimate = useDeskStore((state) => state.estimate);
  const isUncertain = useDeskStore(
    ({ report }) => report?.approaches.some((each) => each.uncertainty !== undefined) ?? false,
  );
  const isStale = useDeskStore((state) => state.reportIsStale);
  const [chosen, setChosen] = useState(0);
  if (!isUncertain) return null;

  const { count, status } = estimate;
  const isRunning = status === 'running';
  // What follows the clones may have been stopped when all of them were carried.
  const larger = CHOICES.filter((each) => each > count || (status === 'stopped' && each === count));
  const goal = larger.includes(chosen) ? chosen : larger[0];
  const canContinue = !isRunning && !isStale && status !== 'idle' && goal !== undefined;
  return (
    <section
      className={isStale ? 'estimate estimate-old' : 'estimate'}
      aria-label="Clones of the uncertain orbit"
    >
      <p className="estimate-words">{unbroken(inWords(estimate))}</p>
      <p className="only-spoken" role="status">
        {spoken(estimate)}
      </p>
      <progress
        className="estimate-rule"
        max={1}
        value={estimate.fraction}
        aria-label="Share of the clones carried"
      />
      <div className="estimate-tools">
        <button
          type="button"
          className="button"
          aria-disabled={!isRunning}
          onClick={() => isRunning && controller.stopEstimate()}
        >
          Stop
        </button>
        <button
          type="button"
          className="button"
          aria-disabled={!canContinue}
          onClick={() => canContinue && controller.continueEstimate(goal)}
        >
          Carry on to
        </button>
        <select
          className="estimate-goal figures"
          aria-label="Number of clones to carry on to"
          disabled={!canContinue}
          value={goal ?? ''}
          onChange={(event) => setChosen(Number(event.target.value))}
        >
          {larger.map((choice) => (
            <option key={choice} value={choice}>
              {grouped(choice)}
            </option>
          ))}
        </select>
      </div>
    </section>
  );
}

/** What is being done for the estimate; at rest, what it can be repeated with. */
export function EstimateNote() {
  const { status, note } = useDeskStore((state) => state.estimate);
  if (status === 'idle') return null;
  const words = status === 'running' && note !== '' ? note : `seed of the clones ${ESTIMATE_SEED}`;
  return <p className="estimate-note">{words}</p>;
}

function inWords({ status, count, wanted, impacts, interval95, error }: EstimateState): string {
  if (status === 'failed') return `The clones could not be carried: ${error}`;
  if (status === 'idle') return 'Clones of the orbit, drawn from its covariance, are carried next.';
  if (interval95 === null || count === 0) return `0 of ${grouped(wanted)} clones carried`;
  const [low, high] = interval95;
  const carried =
    count < wanted ? `${grouped(count)} of ${grouped(wanted)}` : `All ${grouped(count)}`;
  const reach = `${grouped(impacts)} ${impacts === 1 ? 'reaches' : 'reach'} the ground`;
  return `${carried} clones carried; ${reach}: ${percentage(impacts / count)} (${percentage(low)} to ${percentage(high)})`;
}

/** Quarter by quarter, and the outcome. */
function spoken(estimate: EstimateState): string {
  if (estimate.status === 'idle') return '';
  if (estimate.status !== 'running') return inWords(estimate);
  const quarter = Math.floor(estimate.fraction * 4) * 25;
  return quarter === 0 ? 'Carrying clones' : `${quarter}\u2009% of the clones carried`;
}
