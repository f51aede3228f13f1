/** What bodies are made of, by class: ranges of the literature, as a start that anyone may edit. */

export type MaterialClass =
  | 'carbonaceous'
  | 'ordinary chondrite'
  | 'iron'
  | 'cometary'
  | 'rubble pile';

/** Least, customary and largest value. */
export type Span = readonly [low: number, customary: number, high: number];

/** A class of bodies; each range with the place where it was published. */
export interface Material {
  readonly name: MaterialClass;
  /** Bulk density, kg/m³. */
  readonly densityKgM3: Span;
  readonly densitySource: string;
  /** Ram pressure at which the entering body first breaks, Pa. */
  readonly strengthPa: Span;
  readonly strengthSource: string;
  /** σ = C_H / (Q C_D), s²/km². */
  readonly ablationS2Km2: Span;
  readonly ablationSource: string;
  /** α in strength = σ0 (m0/m)^α. */
  readonly weibullExponent: Span;
  readonly weibullSource: string;
  /** Geometric albedo in the visible. */
  readonly albedo: Span;
  readonly albedoSource: string;
}

const POPOVA =
  'Popova et al. (2011), Meteorit. Planet. Sci. 46, 1525: first break-up of recorded falls at 0.1–1 MPa, later ones to 10 MPa; from memory';
const CEPLECHA =
  'Ceplecha et al. (1998), Space Sci. Rev. 84, 327, table of fireball types (σ of types I, II, IIIA, IIIB); range from memory';
const WEIBULL =
  'Weibull (1951); exponents 0.1–0.3 as in Wheeler, Register & Mathias (2017), Icarus 295, 149; from memory';
const CARRY = 'Carry (2012), Planet. Space Sci. 73, 98; from memory';
const ALBEDOS =
  'Thomas et al. (2011), Astron. J. 142, 85, mean albedos of near-Earth objects by class; range from memory';

export const MATERIALS: readonly Material[] = [
  {
    name: 'carbonaceous',
    densityKgM3: [1200, 1700, 2300],
    densitySource: CARRY,
    strengthPa: [1e5, 5e5, 2e6],
    strengthSource: POPOVA,
    ablationS2Km2: [0.02, 0.041, 0.06],
    ablationSource: CEPLECHA,
    weibullExponent: [0.1, 0.2, 0.3],
    weibullSource: WEIBULL,
    albedo: [0.03, 0.06, 0.1],
    albedoSource: ALBEDOS,
  },
  {
    name: 'ordinary chondrite',
    densityKgM3: [2500, 3300, 3700],
    densitySource:
      'Consolmagno, Britt & Macke (2008), Chem. Erde 68, 1 (meteorites, with macroporosity of bodies); from memory',
    strengthPa: [2e5, 1e6, 5e6],
    strengthSource: POPOVA,
    ablationS2Km2: [0.005, 0.014, 0.03],
    ablationSource: CEPLECHA,
    weibullExponent: [0.1, 0.2, 0.3],
    weibullSource: WEIBULL,
    albedo: [0.15, 0.22, 0.4],
    albedoSource: ALBEDOS,
  },
  {
    name: 'iron',
    densityKgM3: [7000, 7800, 8000],
    densitySource: 'Consolmagno, Britt & Macke (2008), Chem. Erde 68, 1; from memory',
    strengthPa: [1e7, 4e7, 1e8],
    strengthSource:
      'Petrovic (2001), J. Mater. Sci. 36, 1579 (strength of meteoritic iron), and Hills & Goda (1993), Astron. J. 105, 1114; from memory',
    ablationS2Km2: [0.01, 0.02, 0.07],
    ablationSource:
      'ReVelle & Ceplecha (1994), Astron. Astrophys. 292, 330 (iron fireballs); from memory',
    weibullExponent: [0.05, 0.1, 0.2],
    weibullSource: 'taken below those of stone: iron has fewer flaws; an assumption',
    albedo: [0.08, 0.15, 0.25],
    albedoSource: ALBEDOS,
  },
  {
    name: 'cometary',
    densityKgM3: [300, 600, 1000],
    densitySource:
      'Weissman & Lowry (2008), Meteorit. Planet. Sci. 43, 1033 (comet nuclei); from memory',
    strengthPa: [1e3, 1e4, 1e5],
    strengthSource:
      'Chyba, Thomas & Zahnle (1993), Nature 361, 40 (comets at 1e5 Pa and below); from memory',
    ablationS2Km2: [0.06, 0.1, 0.2],
    ablationSource: CEPLECHA,
    weibullExponent: [0.1, 0.2, 0.3],
    weibullSource: WEIBULL,
    albedo: [0.02, 0.04, 0.06],
    albedoSource: 'Lamy et al. (2004), in Comets II (nuclei at 0.04 in the visible); from memory',
  },
  {
    name: 'rubble pile',
    densityKgM3: [1200, 1900, 2400],
    densitySource: CARRY,
    strengthPa: [1e4, 1e5, 1e6],
    strengthSource:
      'Sánchez & Scheeres (2014), Meteorit. Planet. Sci. 49, 788 (weak cohesion), with pieces of meteorite strength as upper end; from memory',
    ablationS2Km2: [0.005, 0.014, 0.04],
    ablationSource: CEPLECHA,
    weibullExponent: [0.15, 0.25, 0.4],
    weibullSource: `${WEIBULL}; larger where pieces are much stronger than what holds them`,
    albedo: [0.03, 0.15, 0.4],
    albedoSource: ALBEDOS,
  },
];

/**
 * The preset of a class.
 *
 * @throws RangeError for a name that is none of the classes
 */
export function materialOf(name: MaterialClass): Material {
  const found = MATERIALS.find((material) => material.name === name);
  if (found === undefined) {
    throw new RangeError(`no material named ${name}; one of ${MATERIALS.map((m) => m.name)}`);
  }
  return found;
}

/**
 * Strength of a body of a mass, from that of a body of another.
 *
 * @param strengthPa      Pa, at `referenceKg`
 * @param referenceKg     kg
 * @param massKg          kg
 * @param weibullExponent α; 0 for a strength that does not depend on size
 * @returns               Pa
 * Source: Weibull (1951), J. Appl. Mech. 18, 293: σ = σ0 (m0/m)^α.
 */
export const scaledStrengthPa = (
  strengthPa: number,
  referenceKg: number,
  massKg: number,
  weibullExponent: number,
): number => strengthPa * (referenceKg / massKg) ** weibullExponent;
