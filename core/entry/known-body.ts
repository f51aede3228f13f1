import type { EnsembleSize, WeightedMaterial } from './entry-ensemble';
import type { Body } from './flying-body';
import { MATERIALS, type Material, materialOf, type Span } from './materials';

/** What an entering body is, from the little that a case says of it. */

export interface KnownPhysical {
  absoluteMagnitude?: number;
  diameterM?: number;
  albedo?: number;
  densityKgM3?: number;
  strengthPa?: number;
}

export interface KnownBody {
  size: EnsembleSize;
  materials: WeightedMaterial[];
  /** With customary values throughout: the one that a trajectory is shown of. */
  customary: { body: Body; strengthPa: number; weibullExponent: number };
}

/**
 * Shares of the classes where nothing is known of the stuff: stony ones by far the most, as among falls
 * and spectra of near-Earth objects. Common practice; the shares are ours.
 */
const SHARES = {
  'ordinary chondrite': 0.55,
  carbonaceous: 0.25,
  'rubble pile': 0.12,
  iron: 0.05,
  cometary: 0.03,
} as const;

const certain = (value: number): Span => [value, value, value];

/** @returns null where neither a diameter nor an absolute magnitude is known */
export function knownBody(physical: KnownPhysical): KnownBody | null {
  const { absoluteMagnitude, diameterM, albedo, densityKgM3, strengthPa } = physical;
  if (diameterM === undefined && absoluteMagnitude === undefined) return null;
  const narrowed = (material: Material): Material => ({
    ...material,
    ...(densityKgM3 === undefined
      ? {}
      : { densityKgM3: certain(densityKgM3), densitySource: 'the case' }),
    ...(strengthPa === undefined
      ? {}
      : { strengthPa: certain(strengthPa), strengthSource: 'the case' }),
  });
  const usual = narrowed(materialOf('ordinary chondrite'));
  const diameter =
    diameterM ??
    (1_329_000 * 10 ** (-(absoluteMagnitude ?? 0) / 5)) / Math.sqrt(albedo ?? usual.albedo[1]);
  return {
    size:
      diameterM !== undefined
        ? { diameterM: certain(diameterM) }
        : {
            absoluteMagnitude: absoluteMagnitude ?? 0,
            albedo: albedo === undefined ? null : certain(albedo),
          },
    materials: MATERIALS.map((material) => ({
      material: narrowed(material),
      weight: SHARES[material.name],
    })),
    customary: {
      body: {
        massKg: (Math.PI / 6) * usual.densityKgM3[1] * diameter ** 3,
        densityKgM3: usual.densityKgM3[1],
        ablationS2Km2: usual.ablationS2Km2[1],
        dragCoefficient: 1,
        liftCoefficient: 0,
      },
      strengthPa: usual.strengthPa[1],
      weibullExponent: usual.weibullExponent[1],
    },
  };
}
