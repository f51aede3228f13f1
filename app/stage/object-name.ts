import type { Moment } from './sheet';

const LONGEST = 26;

/** The object's name as it is written in the scenes: short, and the same in both. */
export function objectName(moment: Moment): string {
  const name = moment.report?.case.name ?? 'object';
  return name.length > LONGEST ? `${name.slice(0, LONGEST - 1)}…` : name;
}
