import { describe, expect, it } from 'vitest';
import { DEG_TO_RAD } from '../../core/constants';
import { CLOSE_LOOK, CUSTOMARY_BREAKUP, EntrySimulator } from '../../core/entry/breakup';
import { earthFixedFromEntry } from '../../core/entry/earth-fixed';
import { DEFAULT_FLIGHT } from '../../core/entry/flight';
import { lightCurve, luminousEfficiency } from '../../core/entry/light';
import { type MaterialClass, materialOf, type Span } from '../../core/entry/materials';

/**
 * Recorded events, published inputs against published outputs; all values from memory, as given by the
 * sources named. Nothing is tuned: density, ablation and Weibull exponent are the customary values of
 * the class, strength is its published range. What the models give with them, burst in km:
 *
 *              recorded   pancake (low, customary, high strength)   fragment cloud
 *   2013         29.7       31.0  29.1  25.1                          43.0  35.2  27.9
 *   2008         37         46.6  38.5  30.7                          48.9  39.7  31.3
 *   2018         25.6       28.2  27.5  25.7                          41.0  39.7  32.1
 *
 * The fragment cloud without limits on its spreading bursts high at steep, fast entries: it misses the
 * third by 6 km even at the upper end of strength.
 */
interface Event {
  readonly name: string;
  readonly speedKmS: number;
  readonly downDeg: number;
  readonly massKg: number;
  readonly material: MaterialClass;
  readonly burstKm: number;
}

const JOULE_PER_KT = 4.184e12;
const massOf = (kt: number, speedKmS: number): number =>
  (2 * kt * JOULE_PER_KT) / (speedKmS * 1000) ** 2;

/** Brown et al. (2013), Nature 503, 238, and Popova et al. (2013), Science 342, 1069: LL chondrite. */
const URALS: Event = {
  name: '2013 Feb 15, southern Urals',
  speedKmS: 19.16,
  downDeg: 18.3,
  massKg: massOf(500, 19.16),
  material: 'ordinary chondrite',
  burstKm: 29.7,
};
/** Jenniskens et al. (2009), Nature 458, 485: 4 m, main burst at 37 km; dark and porous (ureilite). */
const NUBIA: Event = {
  name: '2008 Oct 7, Nubian desert',
  speedKmS: 12.4,
  downDeg: 20,
  massKg: (Math.PI / 6) * 4 ** 3 * materialOf('carbonaceous').densityKgM3[1],
  material: 'carbonaceous',
  burstKm: 37,
};
/** JPL CNEOS fireball record (173 kt, 25.6 km, 32 km/s); angle as in Borovička et al. (2020). */
const BERING: Event = {
  name: '2018 Dec 18, Bering sea',
  speedKmS: 32,
  downDeg: 69,
  massKg: massOf(173, 32),
  material: 'ordinary chondrite',
  burstKm: 25.6,
};

function simulate(event: Event, model: 'pancake' | 'fragment cloud', strengthPa: number) {
  const material = materialOf(event.material);
  const simulator = new EntrySimulator(DEFAULT_FLIGHT, CLOSE_LOOK);
  const outcome = simulator.run(
    earthFixedFromEntry({
      latitudeRad: 0.9,
      longitudeRad: 1,
      altitudeKm: 100,
      airSpeedKmS: event.speedKmS,
      airFlightPathAngleRad: -event.downDeg * DEG_TO_RAD,
      airAzimuthRad: 5,
    }),
    {
      massKg: event.massKg,
      densityKgM3: material.densityKgM3[1],
      ablationS2Km2: material.ablationS2Km2[1],
      dragCoefficient: 1,
      liftCoefficient: 0,
    },
    {
      ...CUSTOMARY_BREAKUP,
      model,
      strengthPa,
      strengthMassKg: null,
      weibullExponent: material.weibullExponent[1],
    },
    null,
  );
  return { outcome, simulator };
}

const bursts = (event: Event, model: 'pancake' | 'fragment cloud', strengths: Span): number[] =>
  strengths.map((strength) => {
    const altitude = simulate(event, model, strength).outcome.burstAltitudeKm;
    if (altitude === null) throw new Error(`${event.name} does not break at ${strength} Pa`);
    return altitude;
  });

describe.each([URALS, NUBIA, BERING])('$name', (event) => {
  const strengths = materialOf(event.material).strengthPa;

  it('bursts within 3 km of the recorded altitude at customary strength, as a pancake', () => {
    // Known scatter of the model against recorded bursts: some kilometres (Collins et al. 2017, from
    // memory); strength alone moves it by 3 to 16 km over the published range.
    const [, customary] = bursts(event, 'pancake', strengths);
    expect(Math.abs(customary - event.burstKm)).toBeLessThan(3);
  });

  it('has its recorded altitude inside the range of both models together, to 0.5 km', () => {
    const all = [
      ...bursts(event, 'pancake', strengths),
      ...bursts(event, 'fragment cloud', strengths),
    ];
    expect(event.burstKm).toBeGreaterThan(Math.min(...all) - 0.5);
    expect(event.burstKm).toBeLessThan(Math.max(...all) + 0.5);
    // A range that holds anything would say nothing.
    expect(Math.max(...all) - Math.min(...all)).toBeLessThan(20);
  });

  it('gives nearly all of its energy to the air and leaves no crater', () => {
    for (const model of ['pancake', 'fragment cloud'] as const) {
      const { outcome } = simulate(event, model, strengths[1]);
      expect(outcome.groundKt).toBeLessThan(1e-3 * outcome.entryEnergyKt);
      expect(Math.abs(outcome.energyResidual)).toBeLessThan(1e-3);
    }
  });
});

describe('2013 Feb 15, southern Urals, further', () => {
  it('is as energetic as recorded at the published size of 19.8 m and 3300 kg/m³', () => {
    // 500 ± 100 kt (Brown et al. 2013; Popova et al. 2013 give 590 ± 50).
    const massKg = (Math.PI / 6) * 3300 * 19.8 ** 3;
    const { outcome } = simulate({ ...URALS, massKg }, 'pancake', 1e6);
    expect(outcome.entryEnergyKt).toBeGreaterThan(400);
    expect(outcome.entryEnergyKt).toBeLessThan(640);
  });

  it('is as bright as recorded within a factor of 2: 2.7e13 W/sr', () => {
    // Brown et al. (2013). The efficiency's fit scatters by 1.5, the height of the peak by as much.
    for (const model of ['pancake', 'fragment cloud'] as const) {
      const { outcome, simulator } = simulate(URALS, model, 1e6);
      const light = lightCurve(simulator.deposition, luminousEfficiency(outcome.entryEnergyKt));
      expect(light.peakWSr).toBeGreaterThan(2.7e13 / 2);
      expect(light.peakWSr).toBeLessThan(2.7e13 * 2);
      // Its magnitude then was −27.5 to −28 (ibid.).
      expect(Math.abs(light.peakMagnitude + 27.7)).toBeLessThan(0.75);
    }
  });

  it('lets pieces of hundreds of kilograms through when it is strong, as one of 650 kg was found', () => {
    // Popova et al. (2013): the largest, from Lake Chebarkul, 540–650 kg.
    const { outcome } = simulate(URALS, 'fragment cloud', 5e6);
    const heaviest = Math.max(...outcome.arrivals.map((arrival) => arrival.massKg));
    expect(heaviest).toBeGreaterThan(100);
    expect(heaviest).toBeLessThan(3000);
  });
});
