import type { Approach } from '../../core/report/report';
import { EARTH_RADIUS_KM } from '../worker/core-values';
import { type Area, fontOf, type Pen, rule, write, writeCaps } from './pen';

/** The target plane of the principal approach: where it aims, against what it would hit. */
export function drawTargetPlane(pen: Pen, area: Area, approach: Approach): void {
  const { context, palette } = pen;
  const plane = approach.targetPlane;
  writeCaps(pen, 'Target plane', area.x, area.y, 17, palette.inkSoft);
  const side = area.height - 16;
  const centre = { x: area.x + side / 2, y: area.y + 16 + side / 2 };
  if (plane === null) {
    write(pen, 'Bound: no asymptote.', area.x, area.y + 46, { px: 20 }, palette.ink);
    return;
  }
  const bodyKm = approach.distanceKm / approach.distanceRadii;
  const reach = 1.25 * Math.max(Math.hypot(plane.bDotTKm, plane.bDotRKm), plane.impactRadiusKm);
  const px = side / 2 / reach;
  const at = (t: number, r: number): [number, number] => [centre.x + t * px, centre.y + r * px];
  const disc = (km: number, dash: number[], fill: string | null): void => {
    context.beginPath();
    context.arc(centre.x, centre.y, Math.max(1.5, km * px), 0, 2 * Math.PI);
    if (fill !== null) {
      context.globalAlpha = 0.22;
      context.fillStyle = fill;
      context.fill();
      context.globalAlpha = 1;
    }
    context.setLineDash(dash);
    context.strokeStyle = palette.earth;
    context.lineWidth = 2;
    context.stroke();
    context.setLineDash([]);
  };
  rule(pen, [at(-reach, 0), at(reach, 0)], palette.hairline);
  rule(pen, [at(0, -reach), at(0, reach)], palette.hairline);
  disc(plane.impactRadiusKm, [8, 6], null);
  disc(bodyKm, [], palette.earth);
  const ellipse = approach.uncertainty?.ellipse ?? null;
  if (ellipse !== null) {
    for (const sigmas of [3, 2, 1]) {
      context.beginPath();
      context.ellipse(
        ...at(plane.bDotTKm, plane.bDotRKm),
        Math.max(0.5, sigmas * ellipse.semiMajorKm * px),
        Math.max(0.5, sigmas * ellipse.semiMinorKm * px),
        (ellipse.angleTrDeg * Math.PI) / 180,
        0,
        2 * Math.PI,
      );
      context.globalAlpha = 0.16;
      context.fillStyle = palette.object;
      context.fill();
      context.globalAlpha = 1;
      context.strokeStyle = palette.object;
      context.lineWidth = 1;
      context.stroke();
    }
  }
  rule(pen, [at(0, 0), at(plane.bDotTKm, plane.bDotRKm)], palette.object, 2);
  const [x, y] = at(plane.bDotTKm, plane.bDotRKm);
  context.fillStyle = palette.object;
  context.beginPath();
  context.moveTo(x, y - 9);
  context.lineTo(x + 9, y);
  context.lineTo(x, y + 9);
  context.lineTo(x - 9, y);
  context.fill();
  write(
    pen,
    'T',
    centre.x + side / 2 - 4,
    centre.y - 8,
    { px: 19, weight: 600 },
    palette.inkSoft,
    'right',
  );
  write(pen, 'R', centre.x + 10, centre.y + side / 2 - 6, { px: 19, weight: 600 }, palette.inkSoft);
  const left = area.x + side + 22;
  const width = area.width - side - 22;
  if (width < 180) return;
  const rows: [string, string][] = [
    ['B·T', km(plane.bDotTKm)],
    ['B·R', km(plane.bDotRKm)],
    ['ξ', km(plane.xiKm)],
    ['ζ', km(plane.zetaKm)],
    ['impact radius', km(plane.impactRadiusKm)],
    ...(ellipse === null
      ? []
      : [
          ['1 σ ellipse', `${km(ellipse.semiMajorKm)} × ${km(ellipse.semiMinorKm)}`] as [
            string,
            string,
          ],
        ]),
  ];
  for (const [i, [name, value]] of rows.entries()) {
    const row = area.y + 46 + i * 46;
    write(pen, name, left, row, { px: 18 }, palette.inkSoft);
    context.font = fontOf({ px: 20, figures: true });
    write(pen, value, left + width, row + 22, { px: 20, figures: true }, palette.ink, 'right');
  }
  const words =
    bodyKm === EARTH_RADIUS_KM
      ? ['solid: the Earth', 'dashed: what meets it']
      : ['solid: the body', 'dashed: what meets it'];
  for (const [i, line] of words.entries()) {
    write(pen, line, left, area.y + 318 + (i - words.length + 1) * 20, { px: 16 }, palette.inkSoft);
  }
}

/** Thin-spaced whole kilometres, a true minus. */
function km(value: number): string {
  const digits = Math.abs(Math.round(value))
    .toString()
    .replace(/\B(?=(\d{3})+$)/g, '\u2009');
  return `${value < 0 ? '\u2212' : ''}${digits}\u2009km`;
}
