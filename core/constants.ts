/**
 * Every physical constant the core uses, once: value, unit in the name, source in the comment.
 *
 * Two sets of gravitational parameters are selectable by name (`GmSet`): that of DE405, consistent
 * with the packed ephemeris, and that of DE431, which fits published approaches better.
 */

/** Speed of light, km/s. Exact (SI). */
export const SPEED_OF_LIGHT_KM_S = 299792.458;

/** Astronomical unit, km. IAU 2012 Resolution B2 (exact). Used to read states and elements. */
export const AU_KM = 149597870.7;

/** Astronomical unit of DE405, km: converts that ephemeris's GM values. DE405 header (Standish 1998). */
export const AU_DE405_KM = 149597870.691;

/** Earth-to-Moon mass ratio of DE405. DE405 header (Standish 1998). */
export const EARTH_MOON_MASS_RATIO = 81.30056;

export const SECONDS_PER_DAY = 86400;
export const DAYS_PER_JULIAN_CENTURY = 36525;

/** Julian date of J2000.0 (TT or TDB by context). */
export const JD_J2000 = 2451545;

/** Offset between Julian date and modified Julian date, days. */
export const JD_MINUS_MJD = 2400000.5;

/** Obliquity of the ecliptic of J2000.0, arcseconds. IAU 1976 (Lieske et al. 1977). */
export const OBLIQUITY_J2000_ARCSEC = 84381.448;

export const ARCSEC_TO_RAD = Math.PI / 648000;
export const DEG_TO_RAD = Math.PI / 180;

/** Second zonal harmonic of the Earth (unnormalised). Used with EARTH_RADIUS_KM. JGM-3/EGM96 value. */
export const EARTH_J2 = 0.00108262668;

/** Equatorial radius of the Earth, km. WGS 84. */
export const EARTH_RADIUS_KM = 6378.137;

/** Flattening of the WGS 84 ellipsoid. NIMA TR8350.2. */
export const EARTH_FLATTENING = 1 / 298.257223563;

/** Rotation rate of the Earth, rad/s of UT1. IERS Conventions 2010 (Capitaine et al. 2000, ERA). */
export const EARTH_ROTATION_RAD_S = (2 * Math.PI * 1.00273781191135448) / 86400;

/** Mean radius of the Moon, km. IAU/IAG WGCCRE 2009 (Archinal et al. 2011). */
export const MOON_RADIUS_KM = 1737.4;

/** Entry interface: geodetic altitude, km. Common practice. */
export const ENTRY_INTERFACE_ALTITUDE_KM = 100;

/** Sphere of influence of the Earth, km: a (m/M)^(2/5) = 924 650 km rounded. Common practice. */
export const SPHERE_OF_INFLUENCE_KM = 925000;

/** Mean distance of the Moon, km. Common practice. */
export const MOON_MEAN_DISTANCE_KM = 384400;

/** Geosynchronous radius, km. Common practice. */
export const GEOSYNCHRONOUS_RADIUS_KM = 42164;

/** Upper edge of the shell of low orbits, km above the equatorial radius. Common practice. */
export const LOW_ORBIT_SHELL_ALTITUDE_KM = 2000;

/** The bodies of the packed ephemeris, in the order in which the reader writes them. */
export const BODIES = [
  'Mercury',
  'Venus',
  'Earth',
  'Mars',
  'Jupiter',
  'Saturn',
  'Uranus',
  'Neptune',
  'Pluto',
  'Moon',
  'Sun',
] as const;

export type Body = (typeof BODIES)[number];

/** Index of each body in the ephemeris reader's output and in GM arrays. */
export const BODY_INDEX: Readonly<Record<Body, number>> = {
  Mercury: 0,
  Venus: 1,
  Earth: 2,
  Mars: 3,
  Jupiter: 4,
  Saturn: 5,
  Uranus: 6,
  Neptune: 7,
  Pluto: 8,
  Moon: 9,
  Sun: 10,
};

/** Equatorial radii, km, used for "reaches the surface". IAU/IAG WGCCRE 2009 (Archinal et al. 2011). */
export const BODY_RADIUS_KM: Readonly<Record<Body, number>> = {
  Mercury: 2439.7,
  Venus: 6051.8,
  Earth: EARTH_RADIUS_KM,
  Mars: 3396.19,
  Jupiter: 71492,
  Saturn: 60268,
  Uranus: 25559,
  Neptune: 24764,
  Pluto: 1195,
  Moon: MOON_RADIUS_KM,
  Sun: 696000,
};

export type GmSet = 'DE405' | 'DE431';

/**
 * Second zonal harmonic of the Sun, by set of gravitational parameters (radius 696 000 km).
 * DE431: 2.1106e-7 (Folkner et al. 2014, from memory). The DE405 set leaves it out, as the
 * integrations do that it is there to repeat.
 */
export const SUN_J2: Readonly<Record<GmSet, number>> = { DE405: 0, DE431: 2.1106e-7 };

/** North pole of the Sun, ICRF, degrees. IAU/IAG WGCCRE 2009 (Archinal et al. 2011). */
export const SUN_POLE_RA_DEG = 286.13;
export const SUN_POLE_DEC_DEG = 63.87;

const DE405_AU3_D2_TO_KM3_S2 = AU_DE405_KM ** 3 / SECONDS_PER_DAY ** 2;
/** GM of the Earth-Moon barycentre, au^3/d^2. DE405 header (Standish 1998). */
const DE405_GM_EMB = 8.997011346712499e-10;

/**
 * Gravitational parameters, km^3/s^2, by set and body (planets with their satellites).
 * DE405: header values in au^3/d^2 (Standish 1998), written from memory and checked against
 * the values repeated in the open encounter set's header. That set is there to repeat integrations
 * made with these masses, and those leave Pluto out: its pull moves the slowest of them by 0.2 km.
 * DE431: values published with Folkner et al. 2014 (IPN Progress Report 42-196), from memory.
 */
export const GM_KM3_S2: Readonly<Record<GmSet, Readonly<Record<Body, number>>>> = {
  DE405: {
    Mercury: 4.9125474514508119e-11 * DE405_AU3_D2_TO_KM3_S2,
    Venus: 7.2434524861627027e-10 * DE405_AU3_D2_TO_KM3_S2,
    Earth:
      (DE405_GM_EMB * DE405_AU3_D2_TO_KM3_S2 * EARTH_MOON_MASS_RATIO) / (1 + EARTH_MOON_MASS_RATIO),
    Mars: 9.5495351057792581e-11 * DE405_AU3_D2_TO_KM3_S2,
    Jupiter: 2.8253459095242264e-7 * DE405_AU3_D2_TO_KM3_S2,
    Saturn: 8.4597151856806587e-8 * DE405_AU3_D2_TO_KM3_S2,
    Uranus: 1.2920249167819694e-8 * DE405_AU3_D2_TO_KM3_S2,
    Neptune: 1.5243589007842762e-8 * DE405_AU3_D2_TO_KM3_S2,
    Pluto: 0,
    Moon: (DE405_GM_EMB * DE405_AU3_D2_TO_KM3_S2) / (1 + EARTH_MOON_MASS_RATIO),
    Sun: 2.959122082855911e-4 * DE405_AU3_D2_TO_KM3_S2,
  },
  DE431: {
    Mercury: 22031.78,
    Venus: 324858.592,
    Earth: 398600.435436,
    Mars: 42828.375214,
    Jupiter: 126712764.8,
    Saturn: 37940585.2,
    Uranus: 5794548.6,
    Neptune: 6836527.10058,
    Pluto: 977.0,
    Moon: 4902.800066,
    Sun: 132712440041.9394,
  },
};
