import type { Entry } from '../../../core/report/report';
import { useController } from '../controller-context';
import { grouped, utcWords, withUnit } from '../figures';

/** Where and how the object meets the entry interface. */
export function EntryTable({ entry }: { entry: Entry }) {
  const controller = useController();
  const rows: [string, string][] = [
    ['Latitude, geodetic', hemisphere(entry.latitudeDeg, 'N', 'S')],
    ['Longitude', hemisphere(entry.longitudeDeg, 'E', 'W')],
    ['Altitude over WGS 84', withUnit(grouped(entry.altitudeKm, 1), 'km')],
    ['Speed, inertial', withUnit(grouped(entry.speedKmS, 3), 'km/s')],
    ['Flight-path angle', `${grouped(entry.flightPathAngleDeg, 2)}°`],
    ['Azimuth, from north', `${grouped(entry.azimuthDeg, 2)}°`],
    ['Speed in the rotating air', withUnit(grouped(entry.airSpeedKmS, 3), 'km/s')],
    ['Its flight-path angle', `${grouped(entry.airFlightPathAngleDeg, 2)}°`],
    ['Its azimuth', `${grouped(entry.airAzimuthDeg, 2)}°`],
  ];
  return (
    <section aria-labelledby="entry-title" className="findings-section">
      <h3 id="entry-title" className="caps">
        Entry point
      </h3>
      <p>
        <button
          type="button"
          className="link figures"
          onClick={() => controller.goTo(entry.tdbSeconds)}
        >
          {utcWords(entry.utc)}
        </button>{' '}
        UTC
      </p>
      <dl className="finding-figures">
        {rows.map(([label, text]) => (
          <div key={label}>
            <dt>{label}</dt>
            <dd className="figures">{text}</dd>
          </div>
        ))}
      </dl>
    </section>
  );
}

function hemisphere(degrees: number, positive: string, negative: string): string {
  return withUnit(`${grouped(Math.abs(degrees), 3)}°`, degrees < 0 ? negative : positive);
}
