import {
  BufferAttribute,
  BufferGeometry,
  DataTexture,
  DoubleSide,
  GLSL3,
  LinearFilter,
  LinearMipmapLinearFilter,
  Matrix3,
  Mesh,
  RawShaderMaterial,
  RedFormat,
  RepeatWrapping,
  Sphere,
  type Texture,
  UnsignedByteType,
  Vector2,
  Vector3,
} from 'three';
import { dot, type Mat3, norm, rotate, subtract, type Vec3 } from '../worker/core-geometry';
import { landLevels } from './land-picture';
import type { Projector } from './projection';

/**
 * A globe as one square: each pixel meets the spheroid by itself, so the limb is exact at any zoom
 * and costs four vertices. Night is hatched along circles about the direction away from the Sun.
 */

const VERTEX = `
precision highp float;
in vec3 position;
uniform vec2 size;
uniform vec3 box;
out vec2 place;
void main() {
  place = box.xy + position.xy * box.z;
  gl_Position = vec4(place.x / size.x * 2.0 - 1.0, 1.0 - place.y / size.y * 2.0, 0.0, 1.0);
}`;

const FRAGMENT = `
precision highp float;
in vec2 place;
uniform vec2 size;
uniform float focal;
uniform mat3 toGlobe;
uniform vec3 eye;
uniform vec3 sun;
uniform float axisRatio;
uniform float hatches;
uniform float hatchStrength;
uniform float landLevel;
uniform vec3 day;
uniform vec3 landDay;
uniform vec3 ink;
uniform sampler2D land;
uniform float pixelRatio;
out vec4 result;
const float PI = 3.141592653589793;
void main() {
  vec3 ray = normalize(toGlobe * vec3(place.x - size.x * 0.5, size.y * 0.5 - place.y, focal));
  float nearest = -dot(eye, ray);
  vec3 foot = eye + ray * nearest;
  float off = length(foot);
  float cover = clamp((1.0 - off) / max(fwidth(off), 1e-9) + 0.5, 0.0, 1.0);
  vec3 n = foot - ray * sqrt(max(0.0, 1.0 - off * off));
  float level = landLevel < 0.0 ? 0.0 : textureLod(
    land,
    vec2(atan(n.y, n.x) / (2.0 * PI) + 0.5,
      atan(n.z * axisRatio, length(n.xy)) / PI + 0.5),
    landLevel
  ).r;
  float height = dot(normalize(vec3(n.xy, n.z * axisRatio)), sun);
  float depth = -asin(clamp(height, -1.0, 1.0));
  float turns = depth * hatches;
  float away = abs(fract(turns) - 0.5) / max(fwidth(turns), 1e-6) / pixelRatio;
  float night = clamp(depth * 12.0, 0.0, 1.0);
  float half_ = 0.24 + 0.3 * clamp(depth, 0.0, 1.0);
  float line = clamp((half_ - away) * pixelRatio + 0.5, 0.0, 1.0) * hatchStrength;
  vec3 colour = mix(day, landDay, level);
  colour = mix(colour, ink, night * (0.1 + 0.5 * line));
  result = vec4(colour, nearest > 0.0 ? cover : 0.0);
}`;

/** Spacing of the hatching, px, at the middle of a globe: within a factor of two of this. */
const HATCH_PX = 4;
/** Below this radius the hatching is only a tint, px. */
const HATCHED_FROM_PX = 12;

interface GlobeLook {
  readonly day: readonly [number, number, number];
  readonly land: readonly [number, number, number];
  readonly ink: readonly [number, number, number];
}

export class GlobeInk {
  readonly mesh: Mesh<BufferGeometry, RawShaderMaterial>;

  /** @param hasLand  false for a bare globe */
  constructor(private readonly hasLand: boolean) {
    const geometry = new BufferGeometry();
    geometry.setAttribute(
      'position',
      new BufferAttribute(Float32Array.of(-1, -1, 0, 1, -1, 0, 1, 1, 0, -1, 1, 0), 3),
    );
    geometry.setIndex([0, 1, 2, 0, 2, 3]);
    const material = new RawShaderMaterial({
      glslVersion: GLSL3,
      vertexShader: VERTEX,
      fragmentShader: FRAGMENT,
      uniforms: {
        size: { value: new Vector2(1, 1) },
        box: { value: new Vector3() },
        focal: { value: 1 },
        toGlobe: { value: new Matrix3() },
        eye: { value: new Vector3() },
        sun: { value: new Vector3(1, 0, 0) },
        axisRatio: { value: 1 },
        hatches: { value: 8 },
        hatchStrength: { value: 1 },
        landLevel: { value: -1 },
        day: { value: new Vector3(1, 1, 1) },
        landDay: { value: new Vector3(1, 1, 1) },
        ink: { value: new Vector3(0, 0, 0) },
        land: { value: hasLand ? landTexture() : null },
        pixelRatio: { value: 1 },
      },
      transparent: true,
      // Pixels count downwards, which turns every face over.
      side: DoubleSide,
      forceSinglePass: true,
      depthTest: false,
      depthWrite: false,
    });
    this.mesh = new Mesh(geometry, material);
    this.mesh.frustumCulled = false;
    // Sorting would measure it; the order of drawing is set by hand.
    geometry.boundingSphere = new Sphere();
  }

  /**
   * Places the globe for a frame.
   *
   * @param projector   the picture
   * @param centre      km from the scene's centre, ICRF axes
   * @param radiusKm    equatorial
   * @param flattening  along the third of the globe's own axes
   * @param axes        rotation from ICRF to the globe's own axes
   * @param toSun       unit vector, ICRF axes
   * @param pixelRatio  device pixels per px
   */
  place(
    projector: Projector,
    centre: Vec3,
    radiusKm: number,
    flattening: number,
    axes: Mat3,
    toSun: Vec3,
    pixelRatio: number,
  ): void {
    const { mesh } = this;
    const { uniforms } = mesh.material;
    const squeeze = 1 / (1 - flattening);
    const inGlobe = (v: Vec3): Vec3 => {
      const fixed = rotate(axes, v);
      return [fixed[0] / radiusKm, fixed[1] / radiusKm, (fixed[2] / radiusKm) * squeeze];
    };
    const [rx, ry, rz] = inGlobe(projector.right);
    const [ux, uy, uz] = inGlobe(projector.up);
    const [fx, fy, fz] = inGlobe(projector.forward);
    const toCentre = subtract(centre, projector.eye);
    const radiusPx = projector.radiusPx(centre, radiusKm);
    const middle = projector.project(centre);
    // The farther globe is drawn first.
    mesh.renderOrder = -norm(toCentre);
    const { widthPx, heightPx } = projector;
    const box: Vector3 = uniforms.box.value;
    const reach = boxReach(projector, toCentre, radiusKm);
    if (middle === null || reach === null) {
      box.set(widthPx / 2, heightPx / 2, Math.max(widthPx, heightPx) / 2);
    } else {
      box.set(middle.x, middle.y, reach);
    }
    uniforms.size.value.set(widthPx, heightPx);
    uniforms.focal.value = projector.focalPx;
    uniforms.toGlobe.value.set(rx, ux, fx, ry, uy, fy, rz, uz, fz);
    uniforms.eye.value.set(...inGlobe([-toCentre[0], -toCentre[1], -toCentre[2]]));
    uniforms.sun.value.set(...rotate(axes, toSun));
    uniforms.axisRatio.value = squeeze;
    uniforms.pixelRatio.value = pixelRatio;
    const inView = Math.min(radiusPx, 4 * Math.max(widthPx, heightPx));
    uniforms.hatches.value = 2 ** Math.round(Math.log2(inView / HATCH_PX));
    uniforms.hatchStrength.value = Math.min(1, Math.max(0, radiusPx / HATCHED_FROM_PX - 0.5));
    uniforms.landLevel.value = this.hasLand
      ? Math.max(0, Math.log2(LAND_WIDTH / (2 * Math.PI * radiusPx * pixelRatio)))
      : -1;
  }

  dispose(): void {
    const { geometry, material } = this.mesh;
    geometry.dispose();
    material.dispose();
    const land: Texture | null = material.uniforms.land.value;
    land?.dispose();
  }

  colour(look: GlobeLook): void {
    const { uniforms } = this.mesh.material;
    uniforms.day.value.set(...look.day);
    uniforms.landDay.value.set(...look.land);
    uniforms.ink.value.set(...look.ink);
  }
}

/** Half the side of a square about the centre's picture that holds the globe; null for the whole. */
function boxReach(projector: Projector, toCentre: Vec3, radiusKm: number): number | null {
  const depth = dot(toCentre, projector.forward);
  if (depth <= 2 * radiusKm) return null;
  // The nearest point of the globe is seen largest: a bound that needs no ellipse.
  const across = Math.hypot(dot(toCentre, projector.right), dot(toCentre, projector.up));
  const nearest = depth - radiusKm;
  return projector.focalPx * ((across + radiusKm) / nearest - across / depth) + 2;
}

const LAND_WIDTH = 512;
const COARSEST_LAND_WIDTH = 16;

/**
 * The land's texture with its coarser levels made here: left to the graphics, they spoil the whole
 * picture once the graphics have been lost and given back (seen in software rendering).
 */
function landTexture(): DataTexture {
  const levels = landLevels(LAND_WIDTH, COARSEST_LAND_WIDTH);
  const [{ data, width, height }] = levels;
  const texture = new DataTexture(data, width, height, RedFormat, UnsignedByteType);
  texture.mipmaps = levels;
  texture.wrapS = RepeatWrapping;
  texture.magFilter = LinearFilter;
  texture.minFilter = LinearMipmapLinearFilter;
  texture.needsUpdate = true;
  return texture;
}
