import type { EntryFlight } from './entry-flight';
import { formatNumber, formatSmall } from './figures';
import { figure, finding } from './finding';
import type { Finding } from './report';

/** From this share of the cases on a fate is told as that of all. */
const MOSTLY = 0.95;

type Five = NonNullable<EntryFlight['burstAltitudeKm']>;

/** "27 km (21 to 33)": the median, with 5 and 95 %. */
const range = (of: Five, unit: string, format: (value: number) => string): string =>
  `${format(of[2])}\u2009${unit} (${format(of[0])} to ${format(of[4])})`;
const whole = (value: number): string => formatNumber(value, 0);

/** What the air does to it: sentences with the ranges that an unknown body gives. */
export function entryFlightFinding(flight: EntryFlight): Finding {
  const { members, burst, reachGround, skipOut } = flight;
  const { breakAltitudeKm, burstAltitudeKm, energyMt, diameterM, peakDynamicPressureMPa } = flight;
  const share = (part: number): string => `${formatNumber((100 * part) / members, 0)}\u2009%`;
  const sentences = [
    ...(breakAltitudeKm === null || burstAltitudeKm === null
      ? ['It does not break up in the air.']
      : [
          `${burst > MOSTLY * members ? 'In the air it breaks up' : `In ${share(burst)} of the cases it breaks up in the air,`} near ${range(breakAltitudeKm, 'km', whole)} and bursts near ${range(burstAltitudeKm, 'km', whole)}.`,
        ]),
    ...(energyMt === null || diameterM === null
      ? []
      : [
          `It brings ${range(energyMt, 'Mt', formatSmall)} of TNT with a diameter of ${range(diameterM, 'm', whole)}.`,
        ]),
    ...(reachGround === 0
      ? []
      : [`Half of its energy or more reaches the ground in ${share(reachGround)} of the cases.`]),
    ...(skipOut === 0 ? [] : [`It leaves the air again in ${share(skipOut)}.`]),
    `Medians, with 5 and 95\u2009%, of ${whole(members)} flights from ${flight.from === 'nominal orbit' ? 'the entry of the nominal orbit' : `${whole(flight.entries)} entries of impacting clones`}.`,
  ];
  return finding(
    'entry-flight',
    sentences.join(' '),
    [
      ...(burstAltitudeKm === null ? [] : [figure('burst, median', burstAltitudeKm[2], 'km', 1)]),
      ...(energyMt === null
        ? []
        : [figure('energy at entry, median', energyMt[2], 'Mt', formatSmall(energyMt[2]))]),
      ...(peakDynamicPressureMPa === null
        ? []
        : [
            figure(
              'largest ram pressure, median',
              peakDynamicPressureMPa[2],
              'MPa',
              formatSmall(peakDynamicPressureMPa[2]),
            ),
          ]),
      figure('share that bursts', (100 * burst) / members, '%', 0),
    ],
    {
      model: flight.model,
      formula: 'm dv/dt = −½ C_D ρ A v²; dm/dt = σ m v dv/dt; strength σ0 (m0/m)^α',
      source:
        'U.S. Standard Atmosphere 1976; Bronshten 1983; Hills & Goda 1993; Wheeler et al. 2017; ranges: see the materials in the report',
    },
    null,
    flight.caution,
  );
}
