/** Wind by altitude, for flights that have slowed down. */

/** Where the air goes, by altitude; as many of each, altitudes rising. */
export interface WindProfile {
  readonly altitudesKm: readonly number[];
  /** Towards the east and the north, m/s. */
  readonly eastMS: readonly number[];
  readonly northMS: readonly number[];
}

/** A wind profile that cannot be used. */
export class WindError extends Error {
  readonly code = 'WIND_PROFILE';
}

/**
 * Checks a profile before a flight.
 *
 * @throws WindError where the columns differ in length, hold no row, or altitudes do not rise
 */
export function checkWind(profile: WindProfile): void {
  const { altitudesKm, eastMS, northMS } = profile;
  const rows = altitudesKm.length;
  if (rows === 0 || eastMS.length !== rows || northMS.length !== rows) {
    throw new WindError(
      `wind profile with ${rows} altitudes, ${eastMS.length} east and ${northMS.length} north speeds; expected as many of each, one at least`,
    );
  }
  for (let i = 1; i < rows; i++) {
    if (!(altitudesKm[i] > altitudesKm[i - 1])) {
      throw new WindError(
        `wind profile row ${i + 1}: altitude ${altitudesKm[i]} km does not lie above ${altitudesKm[i - 1]} km; list the rows from the ground up`,
      );
    }
  }
}

/**
 * Wind at a place, as a velocity in ITRF axes.
 *
 * @param profile    linear between its rows, constant beyond its ends
 * @param r          position, km, ITRF axes (3 first components)
 * @param altitudeKm altitude there
 * @param out        receives km/s, ITRF axes (3)
 * Accuracy: east and north are taken about the geocentric radius (0.2° off the normal at most).
 */
export function windAt(
  profile: WindProfile,
  r: Float64Array,
  altitudeKm: number,
  out: Float64Array,
): void {
  const { altitudesKm, eastMS, northMS } = profile;
  const last = altitudesKm.length - 1;
  let i = 0;
  while (i < last && altitudeKm > altitudesKm[i + 1]) i++;
  const next = Math.min(i + 1, last);
  const width = altitudesKm[next] - altitudesKm[i];
  const part = width > 0 ? Math.min(1, Math.max(0, (altitudeKm - altitudesKm[i]) / width)) : 0;
  const east = (eastMS[i] + part * (eastMS[next] - eastMS[i])) / 1000;
  const north = (northMS[i] + part * (northMS[next] - northMS[i])) / 1000;
  const p = Math.sqrt(r[0] * r[0] + r[1] * r[1]);
  const length = Math.sqrt(p * p + r[2] * r[2]);
  const cosLon = p > 0 ? r[0] / p : 1;
  const sinLon = p > 0 ? r[1] / p : 0;
  const sinLat = r[2] / length;
  out[0] = -east * sinLon - north * sinLat * cosLon;
  out[1] = east * cosLon - north * sinLat * sinLon;
  out[2] = (north * p) / length;
}
