import type { Approach, Report } from '../../../core/report/report';
import { useController } from '../controller-context';
import { grouped, utcWords } from '../figures';

const OUTCOMES: Record<Approach['outcome'], string> = {
  pass: 'passes',
  atmosphere: 'into the air',
  impact: 'impact',
};

/** Every close approach of the span; a moment is a button that takes the clock there. */
export function ApproachesTable({ report }: { report: Report }) {
  const controller = useController();
  const { approaches, principal } = report;
  return (
    <section aria-labelledby="approaches-title" className="findings-section">
      <h3 id="approaches-title" className="caps">
        Close approaches
      </h3>
      {approaches.length === 0 ? (
        <p className="soft">None within the search limits in the span.</p>
      ) : (
        <table className="table">
          <thead>
            <tr>
              <th scope="col">Body, UTC</th>
              <th scope="col">km</th>
              <th scope="col">km/s</th>
              <th scope="col">outcome</th>
            </tr>
          </thead>
          <tbody>
            {approaches.map((approach, index) => (
              <tr
                key={`${approach.body} ${approach.tdbSeconds}`}
                className={index === principal ? 'table-principal' : undefined}
              >
                <th scope="row">
                  <span className="table-name">
                    {index === principal && (
                      <>
                        <span aria-hidden="true">▸ </span>
                        <span className="only-spoken">the briefing’s approach: </span>
                      </>
                    )}
                    {approach.body}
                  </span>
                  <button
                    type="button"
                    className="link figures"
                    onClick={() => controller.goTo(approach.tdbSeconds)}
                  >
                    {utcWords(approach.utc)}
                  </button>
                </th>
                <td>{grouped(approach.distanceKm)}</td>
                <td>{grouped(approach.speedKmS, 2)}</td>
                <td className={`outcome-${approach.outcome}`}>{OUTCOMES[approach.outcome]}</td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
    </section>
  );
}
