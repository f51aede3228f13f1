import type { Vec3 } from '../worker/core-geometry';
import { axesOf, type Camera, eyeOf, focalPx } from './camera';

/** A point as it falls on the picture: px from its upper left corner, and km in front of the eye. */
export interface PicturePoint {
  x: number;
  y: number;
  depthKm: number;
}

/**
 * From the scene to the picture, in double precision throughout.
 *
 * Everything is taken relative to the eye first and becomes pixels before it is rounded to the
 * single precision of the graphics: at 1 au a double still resolves 0.03 mm, so nothing jitters at
 * any zoom. No depth buffer is needed (see `occlusion.ts`), hence no near and far plane to choose.
 */
export class Projector {
  readonly eye: Vec3;
  readonly right: Vec3;
  readonly up: Vec3;
  readonly forward: Vec3;
  readonly focalPx: number;

  constructor(
    readonly camera: Camera,
    readonly widthPx: number,
    readonly heightPx: number,
  ) {
    this.eye = eyeOf(camera);
    const axes = axesOf(camera);
    this.right = axes.right;
    this.up = axes.up;
    this.forward = axes.forward;
    this.focalPx = focalPx(widthPx, heightPx);
  }

  /** How long 1 km at the target is seen, px. */
  get pxPerKm(): number {
    return this.focalPx / this.camera.distanceKm;
  }

  /** A point of the scene on the picture; null when it lies behind the eye. */
  project(p: Vec3): PicturePoint | null {
    const { eye, right, up, forward } = this;
    const x = p[0] - eye[0];
    const y = p[1] - eye[1];
    const z = p[2] - eye[2];
    const depthKm = x * forward[0] + y * forward[1] + z * forward[2];
    if (!(depthKm > 0)) return null;
    const k = this.focalPx / depthKm;
    return {
      x: this.widthPx / 2 + k * (x * right[0] + y * right[1] + z * right[2]),
      y: this.heightPx / 2 - k * (x * up[0] + y * up[1] + z * up[2]),
      depthKm,
    };
  }

  /** Radius of a sphere on the picture, px, as seen in the middle of it. */
  radiusPx(centre: Vec3, radiusKm: number): number {
    const { eye } = this;
    const distance = Math.hypot(centre[0] - eye[0], centre[1] - eye[1], centre[2] - eye[2]);
    if (distance <= radiusKm) return Number.POSITIVE_INFINITY;
    return (this.focalPx * radiusKm) / Math.sqrt((distance - radiusKm) * (distance + radiusKm));
  }

  /** Whether a point of the picture lies on it, with a margin (px, negative: inside the edge). */
  shows(point: { x: number; y: number }, marginPx = 0): boolean {
    return (
      point.x >= -marginPx &&
      point.y >= -marginPx &&
      point.x <= this.widthPx + marginPx &&
      point.y <= this.heightPx + marginPx
    );
  }
}
