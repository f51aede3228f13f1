import { geoCircle, geoEquirectangular, geoGraticule10, geoPath } from 'd3-geo';
import { feature } from 'topojson-client';
import type { GeometryCollection, Topology } from 'topojson-specification';
import land from 'world-atlas/land-110m.json';
import type { Approach } from '../../core/report/report';
import { type Area, type Pen, write, writeCaps } from './pen';

/** The place of entry, and of the ground where there is one, on a map about it. */
export function drawGround(pen: Pen, area: Area, approach: Approach): void {
  const { context, palette } = pen;
  const { entry, surfaceImpact } = approach;
  if (entry === undefined) return;
  writeCaps(pen, 'Over the ground', area.x, area.y, 17, palette.inkSoft);
  const box = { x: area.x, y: area.y + 16, width: area.width, height: area.height - 16 };
  const projection = geoEquirectangular()
    .rotate([-entry.longitudeDeg, 0])
    .center([0, Math.max(-55, Math.min(55, entry.latitudeDeg))])
    .translate([box.x + box.width / 2, box.y + box.height / 2])
    .scale(box.width * 0.42)
    .clipExtent([
      [box.x, box.y],
      [box.x + box.width, box.y + box.height],
    ]);
  const path = geoPath(projection, context);
  const stroke = (colour: string, width: number): void => {
    context.strokeStyle = colour;
    context.lineWidth = width;
    context.stroke();
  };
  context.beginPath();
  path(geoGraticule10());
  stroke(palette.hairline, 1);
  const topology = land as unknown as Topology<{ land: GeometryCollection }>;
  context.beginPath();
  path(feature(topology, topology.objects.land));
  stroke(palette.earth, 1.6);
  context.strokeStyle = palette.ink;
  context.lineWidth = 1.5;
  context.strokeRect(box.x, box.y, box.width, box.height);
  // The way it comes, from the azimuth at the interface.
  const far = alongCircle([entry.longitudeDeg, entry.latitudeDeg], entry.airAzimuthDeg + 180, 22);
  context.beginPath();
  path({ type: 'LineString', coordinates: [far, [entry.longitudeDeg, entry.latitudeDeg]] });
  stroke(palette.object, 2.5);
  context.beginPath();
  path(geoCircle().center([entry.longitudeDeg, entry.latitudeDeg]).radius(1.1)());
  stroke(palette.object, 2.5);
  if (surfaceImpact !== undefined) {
    const spot = projection([surfaceImpact.longitudeDeg, surfaceImpact.latitudeDeg]);
    if (spot !== null) {
      const [x, y] = spot;
      context.beginPath();
      context.moveTo(x - 8, y - 8);
      context.lineTo(x + 8, y + 8);
      context.moveTo(x + 8, y - 8);
      context.lineTo(x - 8, y + 8);
      stroke(palette.object, 2.5);
    }
  }
  const words =
    surfaceImpact === undefined
      ? 'ring: entry interface, 100\u2009km'
      : 'ring: entry interface; cross: ground without air';
  context.fillStyle = palette.ground;
  context.fillRect(box.x + 1, box.y + box.height - 29, box.width - 2, 28);
  write(pen, words, box.x + 8, box.y + box.height - 10, { px: 16 }, palette.ink);
}

/** A point so many degrees along a great circle from another, [longitude, latitude] in degrees. */
function alongCircle(from: [number, number], azimuthDeg: number, arcDeg: number): [number, number] {
  const rad = Math.PI / 180;
  const latitude = from[1] * rad;
  const arc = arcDeg * rad;
  const azimuth = azimuthDeg * rad;
  const sine =
    Math.sin(latitude) * Math.cos(arc) + Math.cos(latitude) * Math.sin(arc) * Math.cos(azimuth);
  const east = Math.atan2(
    Math.sin(azimuth) * Math.sin(arc) * Math.cos(latitude),
    Math.cos(arc) - Math.sin(latitude) * sine,
  );
  return [from[0] + east / rad, Math.asin(Math.max(-1, Math.min(1, sine))) / rad];
}
