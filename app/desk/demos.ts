/**
 * The invented cases to look at: none of these objects exists. The first is shown at start.
 *
 * Each was made backwards from an invented pass and is written in another of the forms that the
 * paste area reads.
 */

export interface Demo {
  id: string;
  title: string;
  /** What it is for, in a line. */
  note: string;
  text: string;
}

/** The low pass as an OPM, by the diagonal of its covariance: km², then km²/s². */
const lowPass = (
  name: string,
  id: string,
  [rr, tt, nn, vr, vt, vn]: readonly string[],
  h: string,
): string => `CCSDS_OPM_VERS = 3.0
COMMENT An invented object on an invented approach: nothing in the sky follows this orbit.
CREATION_DATE = 2031-03-01T09:00:00
ORIGINATOR = SKIMLINE DEMO
OBJECT_NAME = ${name}
OBJECT_ID = ${id}
CENTER_NAME = SUN
REF_FRAME = ICRF
TIME_SYSTEM = TDB
EPOCH = 2031-03-01T00:00:00.000
X = -116968342.9423 [km]
Y = 10740112.8277 [km]
Z = 19883009.1765 [km]
X_DOT = -17.3091705923 [km/s]
Y_DOT = -23.9733256970 [km/s]
Z_DOT = -10.7018195987 [km/s]
COV_REF_FRAME = RTN
CX_X = ${rr}
CY_X = 0.0
CY_Y = ${tt}
CZ_X = 0.0
CZ_Y = 0.0
CZ_Z = ${nn}
CX_DOT_X = 0.0
CX_DOT_Y = 0.0
CX_DOT_Z = 0.0
CX_DOT_X_DOT = ${vr}
CY_DOT_X = 0.0
CY_DOT_Y = 0.0
CY_DOT_Z = 0.0
CY_DOT_X_DOT = 0.0
CY_DOT_Y_DOT = ${vt}
CZ_DOT_X = 0.0
CZ_DOT_Y = 0.0
CZ_DOT_Z = 0.0
CZ_DOT_X_DOT = 0.0
CZ_DOT_Y_DOT = 0.0
CZ_DOT_Z_DOT = ${vn}
USER_DEFINED_H = ${h}
USER_DEFINED_G = 0.15
`;

export const DEMOS: Demo[] = [
  {
    id: 'pass',
    title: 'A pass inside the geosynchronous belt',
    note: 'Invented. A CCSDS OPM with a covariance, ten weeks ahead.',
    text: lowPass(
      'Invented A, low pass',
      'INVENTED-A',
      ['900.0', '14400.0', '625.0', '1.6e-10', '2.5e-11', '4.0e-11'],
      '23.9',
    ),
  },
  {
    id: 'wide-miss',
    title: 'A wide miss',
    note: 'Invented. Free text in au and au/d, five months ahead.',
    text: `Invented B, an invented object on an invented approach
heliocentric, ecliptic and equinox of J2000, au and au/d
epoch 2029 Apr 25.0 TDB
X = 0.7033692276654  Y = 0.3596607149747  Z = 0.0434436218715
VX = -0.015174155740128  VY = 0.007615773201275  VZ = 0.000674354148304
H = 20.4
`,
  },
  {
    id: 'graze',
    title: 'A graze of the atmosphere',
    note: 'Invented. Free text in kilometres, six weeks ahead.',
    text: `Invented C, an invented object on an invented approach
centre: Sun   axes: ecliptic J2000   km, km/s
Epoch: 2034-09-20T00:00:00 TDB
90717562.2367  -24713810.4666  -10133661.1308
25.5959476520  33.2730950372  1.2279368029
H = 26.1
`,
  },
  {
    id: 'impact',
    title: 'An impact',
    note: 'Invented. Orbital elements, three and a half weeks ahead.',
    text: `Invented D, an invented object on an invented approach
elements, heliocentric, ecliptic J2000
Epoch  JD 2461946.5 TDB
q     = 0.24062538173839973 au
e     = 0.6177697025799598
i     = 3.610958544619146 deg
node  = 117.33319741546242 deg
argp  = 357.00023853449983 deg
M     = 138.82534905860192 deg
H = 27.3
`,
  },
  {
    id: 'lunar-near-miss',
    title: 'A near miss of the Moon',
    note: 'Invented. A table row with a Julian date, two months ahead.',
    text: `Invented E, an invented object on an invented approach
Sun-centred, ICRF axes, km and km/s
JDTDB, X, Y, Z, VX, VY, VZ
2462482.5, -9565626.1628, 176763622.3352, 62052829.9751, -23.7932934417, -7.5522276460, -1.1656664650
`,
  },
  {
    id: 'slow',
    title: 'A very slow one, held for a while',
    note: 'Invented. An Earth-like orbit that is bound to the Earth at its pass, nine months ahead.',
    text: `Invented F, an invented object on an invented approach
heliocentric ICRF, km, km/s
2032-06-15T00:00:00 TDB
X: -52126870.7222 Y: -124502486.5545 Z: -54058457.8634
VX: 28.1880960708 VY: -9.6407204978 VZ: -4.1360048751
H = 29.0
`,
  },
  {
    id: 'may-hit',
    title: 'A possible impact',
    note: 'Invented. A first solution with a wide covariance: some of what it allows hits.',
    text: lowPass(
      'Invented G, may hit',
      'INVENTED-G',
      ['1.44e6', '2.304e7', '1.0e6', '2.56e-7', '4.0e-8', '6.4e-8'],
      '22.6',
    ),
  },
];
