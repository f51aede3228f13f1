import { ARCSEC_TO_RAD } from '../constants';

const TURN_ARCSEC = 1296000;

/**
 * The fundamental arguments of lunisolar nutation, linear in time.
 *
 * @param centuries  Julian centuries of TT past J2000
 * @returns          l, l′, F, D, Ω (mean anomalies of Moon and Sun, Moon's argument of latitude and
 *                   elongation, longitude of its node), radians within one turn of zero
 * Accuracy: the linear form that IAU 2000B is fitted with; 12″ from the full one within 60 years.
 * Source: Simon et al. (1994), as used by McCarthy & Luzum (2003).
 */
export function delaunayArguments(
  centuries: number,
): readonly [number, number, number, number, number] {
  const angle = (atJ2000: number, rate: number): number =>
    ((atJ2000 + rate * centuries) % TURN_ARCSEC) * ARCSEC_TO_RAD;
  return [
    angle(485868.249036, 1717915923.2178),
    angle(1287104.79305, 129596581.0481),
    angle(335779.526232, 1739527262.8478),
    angle(1072260.70369, 1602961601.209),
    angle(450160.398036, -6962890.5431),
  ];
}
