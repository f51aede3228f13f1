import type { Approach, ApproachBody, Boundary, Report } from '../../core/report/report';
import { distanceWords } from './words';

/** Something that happens along the path and that one can go to. */
export interface RibbonEvent {
  kind: 'approach' | 'crossing' | 'surface';
  tdbSeconds: number;
  utc: string;
  /** From the centre of `body`. */
  distanceKm: number;
  body: ApproachBody;
  direction: 'in' | 'out' | null;
  /** What happens, in words: "Enters the sphere of influence". */
  label: string;
  /** The same as it stands on a flag, and shorter still. */
  flag: string;
  shortFlag: string;
  isPrincipal: boolean;
}

interface BoundaryWords {
  in: string;
  out: string;
  flag: string;
  shortFlag: string;
}

const BOUNDARY_WORDS: Record<Boundary, BoundaryWords> = {
  'sphere-of-influence': {
    in: 'Enters the sphere of influence',
    out: 'Leaves the sphere of influence',
    flag: 'sphere of influence',
    shortFlag: 'sphere',
  },
  'moon-distance': {
    in: 'Comes inside the Moon’s mean distance',
    out: 'Leaves the Moon’s mean distance',
    flag: 'Moon’s distance',
    shortFlag: 'Moon’s',
  },
  geosynchronous: {
    in: 'Comes inside the geosynchronous distance',
    out: 'Leaves the geosynchronous distance',
    flag: 'geosynchronous',
    shortFlag: 'geosync',
  },
  'low-orbit-shell': {
    in: 'Enters the shell of low orbits',
    out: 'Leaves the shell of low orbits',
    flag: 'low orbits',
    shortFlag: 'low',
  },
  'entry-sphere': {
    in: 'Meets the entry sphere',
    out: 'Leaves the entry sphere',
    flag: 'entry sphere',
    shortFlag: 'entry',
  },
  'entry-interface': {
    in: 'Meets the entry interface',
    out: 'Leaves the entry interface',
    flag: 'entry interface',
    shortFlag: 'entry',
  },
  ground: { in: 'Meets the ground', out: 'Leaves the ground', flag: 'ground', shortFlag: 'ground' },
};

const THE: Partial<Record<ApproachBody, string>> = { Earth: 'the Earth', Moon: 'the Moon' };

/**
 * Every approach of a report and every crossing of the principal one, in order of time. An approach
 * that ends on a surface stands there as the surface and not as a periapsis that is never reached;
 * the entry sphere is left out where the entry interface, a second from it, stands.
 */
export function eventsOf(report: Report): RibbonEvent[] {
  return report.approaches
    .flatMap((approach, index) => {
      const isPrincipal = index === report.principal;
      return [
        ...closestOf(approach, isPrincipal),
        ...surfaceOf(approach, isPrincipal),
        ...(isPrincipal ? crossingsOf(approach) : []),
      ];
    })
    .sort((a, b) => a.tdbSeconds - b.tdbSeconds);
}

function closestOf(approach: Approach, isPrincipal: boolean): RibbonEvent[] {
  if (approach.surfaceImpact !== undefined) return [];
  const { body, tdbSeconds, utc, distanceKm } = approach;
  return [
    {
      kind: 'approach',
      tdbSeconds,
      utc,
      distanceKm,
      body,
      direction: null,
      label: `Closest to ${THE[body] ?? body}`,
      flag: `${body} ${distanceWords(distanceKm)}`,
      shortFlag: body,
      isPrincipal,
    },
  ];
}

function surfaceOf(approach: Approach, isPrincipal: boolean): RibbonEvent[] {
  const { body, surfaceImpact, distanceKm, distanceRadii } = approach;
  if (surfaceImpact === undefined) return [];
  const ground = approach.crossings.find((each) => each.boundary === 'ground');
  const what = body === 'Earth' ? 'the ground' : `the surface of ${THE[body] ?? body}`;
  return [
    {
      kind: 'surface',
      tdbSeconds: surfaceImpact.tdbSeconds,
      utc: surfaceImpact.utc,
      distanceKm: ground?.distanceKm ?? distanceKm / distanceRadii,
      body,
      direction: null,
      label: `Meets ${what}`,
      flag: body === 'Earth' ? 'ground' : `${body}, surface`,
      shortFlag: body === 'Earth' ? 'ground' : body,
      isPrincipal,
    },
  ];
}

function crossingsOf({ body, crossings, surfaceImpact }: Approach): RibbonEvent[] {
  return crossings
    .filter(({ boundary, direction }) => {
      if (boundary === 'ground') return surfaceImpact === undefined;
      if (boundary !== 'entry-sphere') return true;
      return !crossings.some(
        (each) => each.boundary === 'entry-interface' && each.direction === direction,
      );
    })
    .map(({ boundary, direction, tdbSeconds, utc, distanceKm }) => {
      const words = BOUNDARY_WORDS[boundary];
      return {
        kind: 'crossing' as const,
        tdbSeconds,
        utc,
        distanceKm,
        body,
        direction,
        label: words[direction],
        flag: words.flag,
        shortFlag: words.shortFlag,
        isPrincipal: true,
      };
    });
}
