import { BODIES, EARTH_MOON_MASS_RATIO } from '../../../core/constants';
import { createEphemeris, type Ephemeris } from '../../../core/ephemeris';
import {
  FILE_VERSION,
  HEADER_BYTES,
  MAGIC,
  RECORD_COUNT,
  RECORD_DOUBLES,
  SERIES,
} from '../../../core/ephemeris/layout';

/** So far away that the heaviest of the others moves nothing by 1e-7 km in ten years. */
const FAR_KM = 1e18;

/**
 * An ephemeris in which one body rests at the barycentre and all others are out of reach: the force
 * model then has laws that can be written down.
 */
export function stillEphemeris(centre: 'Sun' | 'Earth' | 'Jupiter'): Ephemeris {
  const record = new Float64Array(RECORD_DOUBLES);
  const put = (body: number, x: number, y: number): void => {
    const { at, terms, parts } = SERIES[body];
    for (let part = 0; part < parts; part++) {
      record[at + part * terms * 3] = x;
      record[at + part * terms * 3 + terms] = y;
    }
  };
  for (const [body, name] of BODIES.entries()) {
    const turn = (2 * Math.PI * body) / BODIES.length;
    // The Moon's series is geocentric, the Earth's that of the Earth–Moon barycentre.
    if (name === 'Moon') put(body, FAR_KM, 0);
    else if (name === 'Earth' && name === centre)
      put(body, FAR_KM / (1 + EARTH_MOON_MASS_RATIO), 0);
    else if (name !== centre) put(body, FAR_KM * Math.cos(turn), FAR_KM * Math.sin(turn));
  }
  const bytes = new ArrayBuffer(HEADER_BYTES + RECORD_COUNT * RECORD_DOUBLES * 8);
  new Uint32Array(bytes, 0, 4).set([MAGIC, FILE_VERSION, 0, RECORD_COUNT]);
  const doubles = new Float64Array(bytes, HEADER_BYTES);
  for (let i = 0; i < RECORD_COUNT; i++) doubles.set(record, i * RECORD_DOUBLES);
  const ephemeris = createEphemeris();
  ephemeris.addFile(bytes);
  return ephemeris;
}
