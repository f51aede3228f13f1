import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { bodyRadiusKm } from '../../app/charts/plane-axes';
import { planeGeometry, roundStep, unprojected } from '../../app/charts/plane-geometry';
import { planeLine } from '../../app/charts/plane-line';
import {
  discView,
  fittingView,
  limitedHalfKm,
  type PlaneView,
  panned,
  threeSigmaView,
  zoomed,
} from '../../app/charts/plane-view';
import { ellipseRows, planeWords } from '../../app/charts/plane-words';
import { targetPlane } from '../../core/encounter/target-plane';
import { cross, dot, norm, scale, unit, type Vec3 } from '../../core/math/vector';
import type { Approach } from '../../core/report/report';
import { inventedReport } from './fixtures/report';

/** A pass aimed 20 000 km along T and 10 000 km along R, with the impact radius of the Earth. */
function approach(bDotTKm = 20000, bDotRKm = 10000, impactRadiusKm = 9000): Approach {
  const impactParameterKm = Math.hypot(bDotTKm, bDotRKm);
  return {
    ...inventedReport().approaches[0],
    distanceKm: 15945.3425,
    distanceRadii: 2.5,
    targetPlane: {
      bDotTKm,
      bDotRKm,
      // The same B on axes turned by a right angle: ξ along −R, ζ along −T.
      xiKm: -bDotRKm,
      zetaKm: -bDotTKm,
      impactRadiusKm,
      s: [1, 0, 0],
      t: [0, 1, 0],
      r: [0, 0, 1],
    },
    hyperbola: {
      semiMajorAxisKm: -4000,
      eccentricity: 3,
      periapsisKm: 15945,
      impactParameterKm,
      excessSpeedKmS: 10,
      turnAngleDeg: 30,
      asymptoteTrueAnomalyDeg: 110,
      periapsisSpeedKmS: 12,
    },
  };
}

/** A view with the body in the middle. */
const about = (halfKm: number): PlaneView => ({ centre: { across: 0, down: 0 }, halfKm });

/** The same pass with a 1 σ ellipse of so many km. */
function uncertain(semiMajorKm: number, angleTrDeg = 30, angleXiZetaDeg = -120): Approach {
  return {
    ...approach(),
    uncertainty: {
      sigmaDistanceKm: 1,
      sigmaTimeS: 1,
      sigmaSpeedKmS: 1,
      distance3SigmaKm: [0, 1],
      ellipse: {
        semiMajorKm,
        semiMinorKm: semiMajorKm / 10,
        angleTrDeg,
        angleXiZetaDeg,
        covarianceKm2: [1, 0, 1],
      },
      stretchingEarthRadiiPerSigma: 1,
    },
  };
}

const plain = (text: string): string => text.replaceAll('\u2009', ' ').replaceAll('\u2212', '-');

describe('the target plane in pixels', () => {
  it('has T to the right and R downwards, to one scale', () => {
    // 400 px for 2 × 40 000 km: 200 km a pixel.
    const geometry = planeGeometry(approach(), 'tr', about(40000), 600, 400);
    expect(geometry).toMatchObject({ x: 300, y: 200, aim: { x: 400, y: 250 }, capturePx: 45 });
    // 15 945.3425 km are 2.5 radii: 6 378.137 km, 31.890685 px.
    expect(geometry?.discPx).toBeCloseTo(31.890685, 6);
    expect(geometry?.aimIsShown).toBe(true);
  });

  it('has ξ to the right and ζ upwards', () => {
    const geometry = planeGeometry(approach(), 'xi-zeta', about(40000), 600, 400);
    expect(geometry?.aim).toEqual({ x: 250, y: 300 });
  });

  it('counts its ticks from the centre in the sense of each axis', () => {
    const tr = planeGeometry(approach(), 'tr', about(40000), 400, 400)?.ticks;
    const words = (ticks: { words: string }[] | undefined) =>
      ticks?.map((tick) => plain(tick.words));
    // 64 px of 200 km are 12 800 km: the next round step is 20 000 km.
    expect(words(tr?.across)).toEqual(['-40 000', '-20 000', '0', '20 000', '40 000']);
    expect(words(tr?.upright)).toEqual(['-40 000', '-20 000', '0', '20 000', '40 000']);
    const turned = planeGeometry(approach(), 'xi-zeta', about(40000), 400, 400)?.ticks;
    expect(words(turned?.upright)).toEqual(['40 000', '20 000', '0', '-20 000', '-40 000']);
    expect(turned?.upright.map((tick) => tick.px)).toEqual([0, 100, 200, 300, 400]);
  });

  it('shows the aim and the whole capture disc when it fits', () => {
    const inRange = fc.double({ min: -900000, max: 900000, noNaN: true });
    fc.assert(
      fc.property(inRange, inRange, (t, r) => {
        const one = approach(t, r);
        const geometry = planeGeometry(one, 'tr', fittingView(one), 300, 240);
        expect(geometry?.aimIsShown).toBe(true);
        if (geometry === null) throw new Error('no plane');
        const { x, y, capturePx } = geometry;
        expect(Math.min(x, 300 - x, y, 240 - y)).toBeGreaterThan(capturePx);
      }),
    );
  });

  it('shows the whole 3 σ ellipse too, on both axes, unless it is far larger than the rest', () => {
    const angle = fc.double({ min: -180, max: 180, noNaN: true });
    fc.assert(
      fc.property(angle, (degrees) => {
        // From B at atan2(1, 2) on T and R, a right angle on, to −ζ: clockwise on the sheet.
        const one = uncertain(4000, degrees, -(degrees + 90));
        for (const axes of ['tr', 'xi-zeta'] as const) {
          const geometry = planeGeometry(one, axes, fittingView(one), 300, 240);
          if (geometry === null || geometry.ellipse === null) throw new Error('no plane');
          const { aim, ellipse } = geometry;
          const turn = (ellipse.turnDeg * Math.PI) / 180;
          for (const end of [-3, 3]) {
            const x = aim.x + end * ellipse.majorPx * Math.cos(turn);
            const y = aim.y + end * ellipse.majorPx * Math.sin(turn);
            expect(Math.min(x, 300 - x, y, 240 - y)).toBeGreaterThan(0);
          }
        }
      }),
    );
    // Some 22 400 km away: the view does not follow an ellipse of a million.
    expect(fittingView(uncertain(1e6)).halfKm).toBeLessThan(2e5);
  });

  it('says when the aim lies beyond the sheet', () => {
    expect(planeGeometry(approach(), 'tr', about(7000), 400, 400)?.aimIsShown).toBe(false);
  });

  it('zooms from the body’s radius to a million kilometres', () => {
    const one = approach();
    expect(limitedHalfKm(one, 1)).toBe(bodyRadiusKm(one));
    expect(limitedHalfKm(one, 1e9)).toBe(1e6);
    expect(limitedHalfKm(one, 50000)).toBe(50000);
  });

  it('lets a small ellipse be seen closer than the body, and a large one whole', () => {
    expect(threeSigmaView(uncertain(100))?.halfKm).toBeCloseTo(345, 6);
    expect(limitedHalfKm(uncertain(100), 1)).toBeCloseTo(345, 6);
    expect(limitedHalfKm(uncertain(5000), 1)).toBe(bodyRadiusKm(approach()));
    expect(threeSigmaView(uncertain(1e6))?.halfKm).toBeCloseTo(3.45e6, 3);
    expect(threeSigmaView(approach())).toBeNull();
  });

  it('centres the 3 σ ellipse on the aim and the disc on the body', () => {
    expect(threeSigmaView(uncertain(5000))?.centre).toEqual({ across: 20000, down: 10000 });
    expect(discView(approach())).toEqual({ centre: { across: 0, down: 0 }, halfKm: 10350 });
  });

  it('zooms about the place under the pointer, which stays where it is', () => {
    const one = approach();
    const sides = fc.double({ min: 0, max: 400, noNaN: true });
    const factors = fc.double({ min: 0.3, max: 3, noNaN: true });
    fc.assert(
      fc.property(sides, sides, factors, (xPx, yPx, factor) => {
        const before = planeGeometry(one, 'xi-zeta', about(40000), 600, 400);
        if (before === null) throw new Error('no plane');
        const place = unprojected(before.project, xPx, yPx);
        const view = zoomed(one, about(40000), factor, place);
        const after = planeGeometry(one, 'xi-zeta', view, 600, 400);
        if (after === null) throw new Error('no plane');
        const { x0, xT, xR, y0, yT, yR } = after.project;
        expect(view.halfKm).toBeCloseTo(40000 * factor, 6);
        expect(x0 + xT * place.across + xR * place.down).toBeCloseTo(xPx, 6);
        expect(y0 + yT * place.across + yR * place.down).toBeCloseTo(yPx, 6);
      }),
    );
  });

  it('cannot be moved out of sight of everything', () => {
    const far = panned(approach(), about(40000), { across: 1e9, down: -1e9 });
    expect(far.centre).toEqual({ across: 1e6, down: -1e6 });
  });

  it('keeps its ticks on the body’s centre when moved, with decimals where the step has them', () => {
    const aside = { centre: { across: 30000, down: 0 }, halfKm: 40000 };
    const ticks = planeGeometry(approach(), 'tr', aside, 400, 400)?.ticks;
    expect(ticks?.across.map((tick) => plain(tick.words))).toEqual([
      '0',
      '20 000',
      '40 000',
      '60 000',
    ]);
    expect(ticks?.across[0].px).toBeCloseTo(50, 9);
    const close = planeGeometry(uncertain(0.5), 'tr', about(2), 400, 400)?.ticks;
    // 64 px of 0.01 km are 0.64 km: a step of 1 km; a half width of 1 km has 0.5 km.
    expect(close?.across.map((tick) => plain(tick.words))).toEqual(['-2', '-1', '0', '1', '2']);
    const closest = planeGeometry(uncertain(0.5), 'tr', about(1), 400, 400)?.ticks;
    expect(closest?.across.map((tick) => plain(tick.words))).toEqual([
      '-1.0',
      '-0.5',
      '0.0',
      '0.5',
      '1.0',
    ]);
  });

  it('turns any B to the axes ξ and ζ as their definition does', () => {
    const component = fc.double({ min: -1, max: 1, noNaN: true });
    const vector = fc.tuple(component, component, component).filter((v) => norm(v) > 0.1);
    fc.assert(
      fc.property(vector, vector, vector, vector, (incoming, from, velocity, other) => {
        const s = unit(incoming);
        const pole: Vec3 = [0, -0.397777, 0.917482];
        fc.pre(norm(cross(s, pole)) > 0.05 && norm(cross(s, velocity)) > 0.05);
        // At the asymptote the position's part across the motion is B itself.
        fc.pre(norm(cross(s, from)) > 0.05 && norm(cross(s, other)) > 0.05);
        const position = scale(from, 1e5);
        const plane = targetPlane(position, scale(s, 10), s, 10, pole, velocity, 398600.4, 6378);
        const one: Approach = {
          ...approach(),
          targetPlane: { ...plane, s: [...plane.s], t: [...plane.t], r: [...plane.r] },
        };
        const geometry = planeGeometry(one, 'xi-zeta', about(5e4), 400, 400);
        if (geometry === null) throw new Error('no plane');
        // Valsecchi et al. (2003): ζ against the planet's motion in the plane, ξ = S × ζ.
        const along = scale(s, dot(velocity, s));
        const zeta = unit([along[0] - velocity[0], along[1] - velocity[1], along[2] - velocity[2]]);
        const xi = cross(s, zeta);
        const b = scale(other, 1e4);
        const [t, r] = [dot(b, plane.t), dot(b, plane.r)];
        const { x0, xT, xR, y0, yT, yR } = geometry.project;
        // 200 px for 50 000 km; a millionth of a pixel for rounding.
        expect(x0 + xT * t + xR * r).toBeCloseTo(200 + dot(b, xi) / 250, 6);
        expect(y0 + yT * t + yR * r).toBeCloseTo(200 - dot(b, zeta) / 250, 6);
      }),
    );
  });

  it('turns the ellipse with the points', () => {
    // B lies at atan2(10 000, 20 000) on T and R and a right angle on from there on ξ and −ζ.
    const one = uncertain(2000, 30, -120);
    const tr = planeGeometry(one, 'tr', about(40000), 400, 400);
    const xz = planeGeometry(one, 'xi-zeta', about(40000), 400, 400);
    expect(tr?.ellipse?.turnDeg).toBe(30);
    expect(xz?.ellipse?.turnDeg).toBe(120);
    const cos = Math.cos(Math.PI / 6) * 100;
    const sin = Math.sin(Math.PI / 6) * 100;
    const p = xz?.project ?? { x0: 0, xT: 0, xR: 0, y0: 0, yT: 0, yR: 0 };
    const across = p.xT * cos + p.xR * sin;
    const down = p.yT * cos + p.yR * sin;
    expect((Math.atan2(down, across) * 180) / Math.PI).toBeCloseTo(120, 9);
  });

  it('is nothing where the object is bound', () => {
    expect(planeGeometry(inventedReport().approaches[0], 'tr', about(1000), 100, 100)).toBeNull();
  });

  it('has ticks a round step apart and never closer than asked', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-3, max: 1e9, noNaN: true }), (least) => {
        const step = roundStep(least);
        expect(step).toBeGreaterThanOrEqual(least * (1 - 1e-8));
        expect(step).toBeLessThanOrEqual(least * 2.5 * (1 + 1e-8));
        const digit = Number(step.toExponential(6).split('e')[0]);
        expect([1, 2, 5]).toContain(digit);
      }),
    );
  });
});

describe('the line of variations', () => {
  const line = (sigmas: number[], kmPerSigma: number) =>
    sigmas.map((sigma) => ({
      sigma,
      bDotTKm: 20000 + kmPerSigma * sigma,
      bDotRKm: 10000,
      tdbSeconds: 0,
      distanceKm: 1,
    }));
  const project = planeGeometry(approach(), 'tr', about(40000), 600, 400)?.project;
  if (project === undefined) throw new Error('no plane');

  it('has a tick at each whole σ, where that lies between its points', () => {
    const { ticks } = planeLine(line([-2, -1.25, 0, 0.5, 2.2], 10000), project);
    expect(ticks.map(({ sigma }) => sigma)).toEqual([-2, -1, 0, 1, 2]);
    // The aim is at 400, 250; 10 000 km are 50 px.
    ticks.forEach(({ sigma, x, y, nx, ny }) => {
      expect(x).toBeCloseTo(400 + 50 * sigma, 9);
      expect(y).toBeCloseTo(250, 9);
      expect(Math.abs(nx)).toBeCloseTo(0, 12);
      expect(ny).toBeCloseTo(1, 12);
    });
    expect(plain(ticks[0].words)).toBe('-2 σ');
  });

  it('leaves ticks out where they would crowd', () => {
    const sigmas = Array.from({ length: 101 }, (_, i) => (i - 50) / 10);
    // 8 px a σ: every fifth is the first round number of them that is 30 px or more.
    const { ticks } = planeLine(line(sigmas, 1600), project);
    expect(ticks.map(({ sigma }) => sigma)).toEqual([-5, 0, 5]);
    // A tenth of that: only 0 would be left.
    expect(planeLine(line(sigmas, 160), project).ticks).toEqual([]);
  });
});

describe('the target plane in words', () => {
  it('gives the ellipse on the axes shown', () => {
    const words = (axes: 'tr' | 'xi-zeta') =>
      ellipseRows(uncertain(1234.4), axes).map((row) => plain(row.join(' ')));
    expect(words('tr')).toEqual([
      '1 σ half axes 1 234 km × 123 km',
      'major axis, T towards R 30.0°',
    ]);
    expect(words('xi-zeta')[1]).toBe('major axis, ξ towards ζ -120.0°');
    expect(ellipseRows(approach(), 'tr')).toEqual([]);
  });

  it('says on which side of the capture disc the line of motion runs', () => {
    expect(planeWords(approach(20000, 10000, 9000))).toContain('runs outside that disc');
    expect(planeWords(approach(2000, 1000, 9000))).toContain('runs inside that disc');
  });

  it('says why there is none', () => {
    expect(planeWords(inventedReport().approaches[0])).toContain('There is no target plane');
  });
});
