import {
  BufferAttribute,
  BufferGeometry,
  DoubleSide,
  DynamicDrawUsage,
  GLSL3,
  Mesh,
  RawShaderMaterial,
  Sphere,
  Vector2,
} from 'three';

/**
 * All lines of a scene as one mesh: strips two vertices wide, already in pixels.
 *
 * The shader only passes them on and fades the edge over one device pixel, so lines are smooth
 * without multisampling and cost few vertices: what software rendering is short of.
 */

export interface Stroke {
  readonly colour: readonly [number, number, number];
  /** 0 to 1. */
  readonly alpha: number;
  readonly widthPx: number;
  /** Length drawn and length left out, px; null for a solid line. */
  readonly dash: readonly [number, number] | null;
}

/** Well over what the fullest scene was seen to need; strokes beyond it are left out. */
const MOST_VERTICES = 16384;
/** Room beside the line for its faded edge, px. */
const FEATHER_PX = 1;
/** Below this the corner of two pieces is too sharp for a mitre: the strip begins anew. */
const LEAST_MITRE = 0.3;

const VERTEX = `
precision highp float;
in vec3 position;
in vec4 shape;
in vec4 colour;
uniform vec2 size;
out float edge;
out vec4 form;
out vec4 ink;
void main() {
  edge = position.z;
  form = shape;
  ink = colour;
  gl_Position = vec4(position.x / size.x * 2.0 - 1.0, 1.0 - position.y / size.y * 2.0, 0.0, 1.0);
}`;

const FRAGMENT = `
precision highp float;
in float edge;
in vec4 form;
in vec4 ink;
uniform float pixelRatio;
out vec4 result;
void main() {
  float cover = clamp((form.x - abs(edge)) * pixelRatio + 0.5, 0.0, 1.0);
  if (form.w > 0.0) {
    float place = mod(form.y, form.w);
    float inside = min(place, form.z - place);
    cover *= clamp(inside * pixelRatio + 0.5, 0.0, 1.0);
  }
  result = vec4(ink.rgb, ink.a * cover);
}`;

export class LineBuffer {
  private readonly geometry = new BufferGeometry();
  private readonly material = new RawShaderMaterial({
    glslVersion: GLSL3,
    vertexShader: VERTEX,
    fragmentShader: FRAGMENT,
    uniforms: { size: { value: new Vector2(1, 1) }, pixelRatio: { value: 1 } },
    transparent: true,
    side: DoubleSide,
    forceSinglePass: true,
    depthTest: false,
    depthWrite: false,
  });
  readonly mesh = new Mesh(this.geometry, this.material);
  /** Vertices in use. */
  count = 0;
  private indexCount = 0;
  private readonly position = new Float32Array(3 * MOST_VERTICES);
  private readonly shape = new Float32Array(4 * MOST_VERTICES);
  private readonly colour = new Uint8Array(4 * MOST_VERTICES);
  private readonly index = new Uint16Array(3 * MOST_VERTICES);
  private readonly attributes: BufferAttribute[];

  constructor() {
    const position = new BufferAttribute(this.position, 3);
    const shape = new BufferAttribute(this.shape, 4);
    const colour = new BufferAttribute(this.colour, 4, true);
    const index = new BufferAttribute(this.index, 1);
    this.geometry.setAttribute('position', position);
    this.geometry.setAttribute('shape', shape);
    this.geometry.setAttribute('colour', colour);
    this.geometry.setIndex(index);
    this.attributes = [position, shape, colour, index];
    for (const attribute of this.attributes) attribute.setUsage(DynamicDrawUsage);
    this.mesh.frustumCulled = false;
    // Sorting would measure it; the order of drawing is set by hand.
    this.geometry.boundingSphere = new Sphere();
    this.mesh.renderOrder = 1;
  }

  begin(widthPx: number, heightPx: number, pixelRatio: number): void {
    this.count = 0;
    this.indexCount = 0;
    this.material.uniforms.size.value.set(widthPx, heightPx);
    this.material.uniforms.pixelRatio.value = pixelRatio;
  }

  /**
   * Appends a line.
   *
   * @param points  x, y (px) and length drawn so far (px) of each point
   * @param count   how many points
   */
  strip(points: Float64Array, count: number, stroke: Stroke): void {
    if (count < 2 || this.count + 4 * count > MOST_VERTICES) return;
    const period = stroke.dash === null ? 0 : stroke.dash[0] + stroke.dash[1];
    // Whole periods are dropped in double precision: the dash must not depend on a long way.
    const skipped = period > 0 ? Math.floor(points[2] / period) * period : points[2];
    let nx = 0;
    let ny = 0;
    for (let i = 0; i < count; i++) {
      const at = 3 * i;
      let mx: number;
      let my: number;
      if (i === count - 1) {
        [mx, my] = [nx, ny];
      } else {
        const dx = points[at + 3] - points[at];
        const dy = points[at + 4] - points[at + 1];
        const length = Math.hypot(dx, dy);
        const ax = -dy / length;
        const ay = dx / length;
        const mitre = 1 + ax * nx + ay * ny;
        if (i > 0 && mitre < LEAST_MITRE) {
          this.pair(points, at, nx, ny, skipped, period, stroke, true);
          this.pair(points, at, ax, ay, skipped, period, stroke, false);
          [nx, ny] = [ax, ay];
          continue;
        }
        [mx, my] = i === 0 ? [ax, ay] : [(ax + nx) / mitre, (ay + ny) / mitre];
        [nx, ny] = [ax, ay];
      }
      this.pair(points, at, mx, my, skipped, period, stroke, i > 0);
    }
  }

  /** Hands the frame's lines to the graphics. */
  end(): void {
    const lengths = [3 * this.count, 4 * this.count, 4 * this.count, this.indexCount];
    for (const [i, attribute] of this.attributes.entries()) {
      attribute.clearUpdateRanges();
      attribute.addUpdateRange(0, lengths[i]);
      attribute.needsUpdate = true;
    }
    this.geometry.setDrawRange(0, this.indexCount);
  }

  dispose(): void {
    this.geometry.dispose();
    this.material.dispose();
  }

  private pair(
    points: Float64Array,
    at: number,
    nx: number,
    ny: number,
    skipped: number,
    period: number,
    stroke: Stroke,
    joined: boolean,
  ): void {
    const { position, shape, colour, index } = this;
    const half = stroke.widthPx / 2;
    const reach = half + FEATHER_PX;
    const first = this.count;
    for (let side = -1; side <= 1; side += 2) {
      const v = this.count++;
      position[3 * v] = points[at] + side * reach * nx;
      position[3 * v + 1] = points[at + 1] + side * reach * ny;
      position[3 * v + 2] = side * reach;
      shape[4 * v] = half;
      shape[4 * v + 1] = points[at + 2] - skipped;
      shape[4 * v + 2] = stroke.dash === null ? 0 : stroke.dash[0];
      shape[4 * v + 3] = period;
      colour[4 * v] = stroke.colour[0];
      colour[4 * v + 1] = stroke.colour[1];
      colour[4 * v + 2] = stroke.colour[2];
      colour[4 * v + 3] = Math.round(255 * stroke.alpha);
    }
    if (!joined) return;
    const corners = [first - 2, first - 1, first, first - 1, first + 1, first];
    for (const corner of corners) index[this.indexCount++] = corner;
  }
}
