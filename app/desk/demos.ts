/** The invented cases to look at: none of these objects exists. The first is shown at start. */

export interface Demo {
  id: string;
  title: string;
  /** What it is for, in a line. */
  note: string;
  text: string;
}

export const DEMOS: Demo[] = [
  {
    id: 'first',
    title: 'A pass inside the Moon’s distance',
    note: 'An invented object on an invented approach.',
    text: `CCSDS_OPM_VERS = 3.0
COMMENT An invented object on an invented approach: nothing in the sky follows this orbit.
CREATION_DATE = 2026-01-01T00:00:00
ORIGINATOR = SKIMLINE DEMO
OBJECT_NAME = Invented pass
OBJECT_ID = INVENTED-A
CENTER_NAME = SUN
REF_FRAME = ICRF
TIME_SYSTEM = TDB
EPOCH = 2031-03-01T00:00:00.000
X = -148000000.0
Y = 42000000.0
Z = 18300000.0
X_DOT = -11.2
Y_DOT = -26.9
Z_DOT = -12.4
`,
  },
];
