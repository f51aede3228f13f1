import type { Approach, Boundary } from '../../../core/report/report';
import { useController } from '../controller-context';
import { grouped, utcWords } from '../figures';

const BOUNDARIES: Record<Boundary, string> = {
  'sphere-of-influence': 'Sphere of influence',
  'moon-distance': 'Moon’s mean distance',
  geosynchronous: 'Geosynchronous radius',
  'low-orbit-shell': 'Low-orbit shell, 2\u2009000\u2009km',
  'entry-sphere': 'Entry sphere, 6\u2009478\u2009km',
  'entry-interface': 'Entry interface, 100\u2009km',
  ground: 'Ground',
};

/** The named boundaries the object crosses on the way in and out of the principal approach. */
export function CrossingsTable({ approach }: { approach: Approach }) {
  const controller = useController();
  if (approach.crossings.length === 0) return null;
  return (
    <section aria-labelledby="crossings-title" className="findings-section">
      <h3 id="crossings-title" className="caps">
        Crossings
      </h3>
      <table className="table">
        <thead>
          <tr>
            <th scope="col">Boundary, UTC</th>
            <th scope="col">way</th>
            <th scope="col">km</th>
            <th scope="col">km/s</th>
          </tr>
        </thead>
        <tbody>
          {approach.crossings.map((crossing) => (
            <tr key={`${crossing.boundary} ${crossing.direction} ${crossing.tdbSeconds}`}>
              <th scope="row">
                <span className="table-name">{BOUNDARIES[crossing.boundary]}</span>
                <button
                  type="button"
                  className="link figures"
                  onClick={() => controller.goTo(crossing.tdbSeconds)}
                >
                  {utcWords(crossing.utc)}
                </button>
              </th>
              <td>{crossing.direction}</td>
              <td>{grouped(crossing.distanceKm)}</td>
              <td>{grouped(crossing.speedKmS, 2)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}
