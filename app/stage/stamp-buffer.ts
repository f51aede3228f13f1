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
  Vector3,
} from 'three';
import type { Rgb } from './inks';
import type { LabelStyle } from './labels';
import { Lettering } from './lettering';

/** Marks and words of a fixed size on the picture, as one mesh of squares in pixels. */

export interface Mark {
  readonly x: number;
  readonly y: number;
  /** Half its width and half its height, px. */
  readonly halfWidthPx: number;
  readonly halfHeightPx: number;
  readonly fill: Rgb;
  readonly edge: Rgb;
  readonly edgePx: number;
  /** Clearing in the ground's colour around it, px. */
  readonly haloPx: number;
}

const WORD = 0;
const DISC = 1;
const LOZENGE = 2;
const MOST_STAMPS = 512;

const VERTEX = `
precision highp float;
in vec3 position;
in vec4 shape;
in vec4 form;
in vec4 fill;
in vec4 edge;
uniform vec2 size;
out vec2 place;
out vec2 half_;
out vec3 look;
out vec3 inside;
out vec3 outside;
void main() {
  place = shape.xy;
  half_ = shape.zw;
  look = vec3(form.xy, position.z);
  inside = fill.rgb;
  outside = edge.rgb;
  gl_Position = vec4(position.x / size.x * 2.0 - 1.0, 1.0 - position.y / size.y * 2.0, 0.0, 1.0);
}`;

const FRAGMENT = `
precision highp float;
in vec2 place;
in vec2 half_;
in vec3 look;
in vec3 inside;
in vec3 outside;
uniform sampler2D words;
uniform vec2 wordsSize;
uniform vec3 ground;
uniform float pixelRatio;
out vec4 result;
float within(float off) { return clamp(0.5 - off * pixelRatio, 0.0, 1.0); }
void main() {
  if (look.z < 0.5) {
    vec2 word = texture(words, place / wordsSize).rg;
    result = vec4(mix(ground, inside, word.r), max(word.r, word.g));
    return;
  }
  float off = look.z < 1.5
    ? length(place) - half_.x
    : (abs(place.x) / half_.x + abs(place.y) / half_.y - 1.0) * half_.x * half_.y / length(half_);
  float edge = look.x * 0.5;
  float halo = within(off - edge - look.y);
  vec3 colour = mix(ground, outside, within(off - edge));
  colour = mix(colour, inside, within(off + edge));
  result = vec4(colour, halo);
}`;

/** Corners of a square in turn, and the triangles between them. */
const CORNERS = [-1, -1, 1, -1, 1, 1, -1, 1];
const TRIANGLES = [0, 1, 2, 0, 2, 3];

export class StampBuffer {
  readonly lettering = new Lettering();
  readonly mesh: Mesh<BufferGeometry, RawShaderMaterial>;
  private count = 0;
  private pixelRatio = 1;
  private readonly position = new Float32Array(12 * MOST_STAMPS);
  private readonly shape = new Float32Array(16 * MOST_STAMPS);
  private readonly form = new Float32Array(16 * MOST_STAMPS);
  private readonly fill = new Uint8Array(16 * MOST_STAMPS);
  private readonly edge = new Uint8Array(16 * MOST_STAMPS);
  private readonly attributes: BufferAttribute[] = [];

  constructor() {
    const geometry = new BufferGeometry();
    const attach = (name: string, attribute: BufferAttribute) => {
      attribute.setUsage(DynamicDrawUsage);
      geometry.setAttribute(name, attribute);
      this.attributes.push(attribute);
    };
    attach('position', new BufferAttribute(this.position, 3));
    attach('shape', new BufferAttribute(this.shape, 4));
    attach('form', new BufferAttribute(this.form, 4));
    attach('fill', new BufferAttribute(this.fill, 4, true));
    attach('edge', new BufferAttribute(this.edge, 4, true));
    const index = Uint16Array.from({ length: 6 * MOST_STAMPS }, (_, i) => {
      return 4 * Math.floor(i / 6) + TRIANGLES[i % 6];
    });
    geometry.setIndex(new BufferAttribute(index, 1));
    const material = new RawShaderMaterial({
      glslVersion: GLSL3,
      vertexShader: VERTEX,
      fragmentShader: FRAGMENT,
      uniforms: {
        size: { value: new Vector2(1, 1) },
        words: { value: this.lettering.texture },
        wordsSize: { value: this.lettering.size },
        ground: { value: new Vector3() },
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
    this.mesh.renderOrder = 2;
  }

  begin(widthPx: number, heightPx: number, pixelRatio: number, ground: Rgb): void {
    this.count = 0;
    this.pixelRatio = pixelRatio;
    this.lettering.begin(pixelRatio);
    const { uniforms } = this.mesh.material;
    uniforms.size.value.set(widthPx, heightPx);
    uniforms.pixelRatio.value = pixelRatio;
    uniforms.ground.value.set(ground[0] / 255, ground[1] / 255, ground[2] / 255);
  }

  disc(mark: Mark): void {
    this.mark(DISC, mark);
  }

  lozenge(mark: Mark): void {
    this.mark(LOZENGE, mark);
  }

  /** A word with its middle at a point; set on whole device pixels, so that it stays sharp. */
  word(x: number, y: number, style: LabelStyle, text: string, colour: Rgb): void {
    const word = this.lettering.word(style, text);
    if (word === null) return;
    const { pixelRatio } = this;
    const left = Math.round(x * pixelRatio - word.width / 2);
    const top = Math.round(y * pixelRatio - word.height / 2);
    this.square(
      (left + word.width / 2) / pixelRatio,
      (top + word.height / 2) / pixelRatio,
      word.width / 2 / pixelRatio,
      word.height / 2 / pixelRatio,
      WORD,
      colour,
      colour,
    );
    const first = 16 * (this.count - 1);
    for (let i = 0; i < 4; i++) {
      this.shape[first + 4 * i] = word.left + (word.width * (1 + CORNERS[2 * i])) / 2;
      this.shape[first + 4 * i + 1] = word.top + (word.height * (1 + CORNERS[2 * i + 1])) / 2;
    }
  }

  /** Hands the frame's stamps to the graphics. */
  end(): void {
    for (const attribute of this.attributes) {
      attribute.clearUpdateRanges();
      attribute.addUpdateRange(0, 4 * this.count * attribute.itemSize);
      attribute.needsUpdate = true;
    }
    this.mesh.geometry.setDrawRange(0, 6 * this.count);
  }

  dispose(): void {
    this.mesh.geometry.dispose();
    this.mesh.material.dispose();
    this.lettering.dispose();
  }

  private mark(kind: number, mark: Mark): void {
    const reach = mark.edgePx / 2 + mark.haloPx + 1;
    const wide = mark.halfWidthPx + reach;
    const high = mark.halfHeightPx + reach;
    if (!this.square(mark.x, mark.y, wide, high, kind, mark.fill, mark.edge)) return;
    const first = 16 * (this.count - 1);
    for (let i = 0; i < 4; i++) {
      const at = first + 4 * i;
      this.shape[at] = CORNERS[2 * i] * wide;
      this.shape[at + 1] = CORNERS[2 * i + 1] * high;
      this.shape[at + 2] = mark.halfWidthPx;
      this.shape[at + 3] = mark.halfHeightPx;
      this.form[at] = mark.edgePx;
      this.form[at + 1] = mark.haloPx;
    }
  }

  private square(
    x: number,
    y: number,
    wide: number,
    high: number,
    kind: number,
    fill: Rgb,
    edge: Rgb,
  ): boolean {
    if (this.count === MOST_STAMPS) return false;
    const first = 4 * this.count;
    for (let i = 0; i < 4; i++) {
      const at = first + i;
      this.position[3 * at] = x + CORNERS[2 * i] * wide;
      this.position[3 * at + 1] = y + CORNERS[2 * i + 1] * high;
      this.position[3 * at + 2] = kind;
      for (let k = 0; k < 3; k++) {
        this.fill[4 * at + k] = fill[k];
        this.edge[4 * at + k] = edge[k];
      }
    }
    this.count += 1;
    return true;
  }
}
