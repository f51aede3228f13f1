import type { FieldName } from './types';

/** Labels that people write before a value, longest spoken forms first. */

export interface Label {
  /** Null: a known value that is not used (mean motion, aphelion, period…). */
  field: FieldName | null;
  /**
   * What stands behind it: an instant, a number of the body (whose unit is its own), or one of the
   * state (whose unit is said for all).
   */
  kind: 'epoch' | 'body' | 'state';
  pattern: RegExp;
}

/** A unit in brackets, then "=" or ":". */
const SIGN = String.raw`\s*(?:[\[(][^\])]{0,12}[\])])?\s*[:=]\s*`;
/**
 * At the start of a line, behind a comma, in a column of its own or behind a number a label may
 * stand without a sign.
 */
const BARE = String.raw`(?<=^[\s#*|]{0,12}|[,;\t|]\s*|\s{2}|\d\s)`;

function label(
  field: FieldName | null,
  words: string,
  {
    bare = false,
    kind = 'state',
    flags = 'giu',
  }: { bare?: boolean; kind?: Label['kind']; flags?: string } = {},
): Label {
  const signed = String.raw`(?<![\p{L}\d_.])(?:${words})\.?${SIGN}`;
  const unsigned = String.raw`${BARE}(?:${words})\.?\s*(?:[\[(][^\])]{0,12}[\])])?\s+(?=[+\-\u2212.\d])`;
  return {
    field,
    kind,
    pattern: new RegExp(bare ? `${signed}|${unsigned}` : signed, flags),
  };
}

const time =
  'time of (?:periapsis|perihelion|perigee)(?: passage)?|(?:periapsis|perihelion) (?:time|date|passage)|t_?p(?:eri)?';

export const LABELS: readonly Label[] = [
  label('periapsisTime', time, { kind: 'epoch', bare: true }),
  label('periapsisTime', 'T', { kind: 'epoch', flags: 'gu' }),
  label('vx', String.raw`v_?x|x_?dot|dx\/dt|velocity[ _]x|ẋ`, { bare: true }),
  label('vy', String.raw`v_?y|y_?dot|dy\/dt|velocity[ _]y|ẏ`, { bare: true }),
  label('vz', String.raw`v_?z|z_?dot|dz\/dt|velocity[ _]z|ż`, { bare: true }),
  label('x', 'r_?x|position[ _]x|pos_?x|x', { bare: true }),
  label('y', 'r_?y|position[ _]y|pos_?y|y', { bare: true }),
  label('z', 'r_?z|position[ _]z|pos_?z|z', { bare: true }),
  label('semiMajorAxis', String.raw`semi-?\s?major axis|sma|a`, { bare: true }),
  label('periapsisDistance', '(?:perihelion|periapsis|perigee) distance|qr', {
    bare: true,
  }),
  label('periapsisDistance', 'q', { bare: true, flags: 'gu' }),
  label('eccentricity', 'eccentricity|ecc?|e', { bare: true }),
  label('inclination', 'inclination|incl?|i|in', { bare: true }),
  label(
    'node',
    String.raw`(?:longitude|long\.?) of (?:the )?(?:ascending )?node|(?:ascending |asc\.? )?node|raan|lan|om`,
    { bare: true },
  ),
  label(
    'argumentOfPeriapsis',
    String.raw`(?:argument|arg\.?) of (?:periapsis|perihelion|perigee|pericent(?:er|re))|arg_?p(?:eri)?|aop|peri|w`,
    { bare: true },
  ),
  // Apart from the others: without regard to case Ω and ω are one letter.
  label('node', 'Ω', { bare: true, flags: 'gu' }),
  label('argumentOfPeriapsis', 'ω', { bare: true, flags: 'gu' }),
  label('meanAnomaly', 'mean anomaly|m_?0?|ma', { bare: true }),
  label('trueAnomaly', 'true anomaly|ta|nu|ν|f', { bare: true }),
  label(null, 'mean motion|n|aphelion distance|ad|period|pr', { bare: true }),
  label(null, 'Q|P|LT|RG|RR', { flags: 'gu' }),
  label('a1', 'a1', { bare: true, kind: 'body' }),
  label('a2', 'a2', { bare: true, kind: 'body' }),
  label('a3', 'a3', { bare: true, kind: 'body' }),
  label('absoluteMagnitude', 'absolute magnitude|H', { flags: 'gu', bare: true, kind: 'body' }),
  label('slopeParameter', 'slope parameter|G', { flags: 'gu', bare: true, kind: 'body' }),
  label('diameter', 'diameter(?:_m)?', { bare: true, kind: 'body' }),
  label('albedo', 'albedo', { bare: true, kind: 'body' }),
  label('density', 'density(?:_kg_m3)?', { bare: true, kind: 'body' }),
  label('strength', 'strength(?:_pa)?', { bare: true, kind: 'body' }),
];
