import { CanvasTexture, LinearFilter, NoColorSpace, Vector2 } from 'three';
import { LABEL_FONTS, type LabelStyle, NAME_SPACING_PX } from './labels';

/**
 * Words as stamps: each is written once into an atlas and from then on costs four vertices a frame.
 * (A second canvas over the scene for the lettering took more time in software rendering than the
 * scene itself.)
 *
 * Red holds the letters, green the narrow clearing around them, so a word serves in any colour.
 */

const ATLAS_WIDTH_PX = 1024;
const ATLAS_HEIGHT_PX = 512;
const HALO_PX = 1.75;
/** Room around a word in the atlas, px of the picture. */
const MARGIN_PX = 3;
const HEIGHT_PX = 17;

/** Where a word lies in the atlas, device pixels. */
export interface Word {
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
}

export class Lettering {
  readonly texture: CanvasTexture;
  readonly size = new Vector2(ATLAS_WIDTH_PX, ATLAS_HEIGHT_PX);
  private readonly context: CanvasRenderingContext2D | null;
  private readonly words = new Map<string, Word>();
  private readonly widths = new Map<string, number>();
  private pixelRatio = 1;
  private left = 0;
  private top = 0;

  constructor() {
    const canvas = document.createElement('canvas');
    canvas.width = ATLAS_WIDTH_PX;
    canvas.height = ATLAS_HEIGHT_PX;
    this.context = canvas.getContext('2d', { willReadFrequently: true });
    this.texture = new CanvasTexture(canvas);
    this.texture.colorSpace = NoColorSpace;
    this.texture.flipY = false;
    this.texture.generateMipmaps = false;
    this.texture.minFilter = LinearFilter;
    this.clear();
  }

  /** Words are written for this many device pixels per px. */
  begin(pixelRatio: number): void {
    if (pixelRatio === this.pixelRatio) return;
    this.pixelRatio = pixelRatio;
    this.clear();
  }

  /** Width of a word on the picture, px. */
  width(style: LabelStyle, text: string): number {
    const key = `${style} ${text}`;
    const known = this.widths.get(key);
    if (known !== undefined || this.context === null) return known ?? 0;
    const width = this.context.measureText(this.dress(this.context, style, text, 1)).width;
    this.widths.set(key, width);
    return width;
  }

  /** The word in the atlas, written there if it is new. */
  word(style: LabelStyle, text: string): Word | null {
    const key = `${style} ${text}`;
    const known = this.words.get(key);
    const { context, pixelRatio } = this;
    if (known !== undefined || context === null) return known ?? null;
    const width = Math.ceil((this.width(style, text) + 2 * MARGIN_PX) * pixelRatio);
    const height = Math.ceil(HEIGHT_PX * pixelRatio);
    if (this.left + width > ATLAS_WIDTH_PX) {
      this.left = 0;
      this.top += height;
    }
    // A full atlas is emptied; the words of this frame are written again in the next.
    if (this.top + height > ATLAS_HEIGHT_PX) this.clear();
    const word = { left: this.left, top: this.top, width, height };
    this.left += width;
    this.words.set(key, word);
    this.write(context, word, style, text);
    this.texture.needsUpdate = true;
    return word;
  }

  /** Forgets everything: the type has arrived, or the atlas is full. */
  clear(): void {
    this.words.clear();
    this.widths.clear();
    this.left = 0;
    this.top = 0;
    const { context } = this;
    if (context === null) return;
    context.globalCompositeOperation = 'source-over';
    context.fillStyle = '#000';
    context.fillRect(0, 0, ATLAS_WIDTH_PX, ATLAS_HEIGHT_PX);
    this.texture.needsUpdate = true;
  }

  dispose(): void {
    this.texture.dispose();
  }

  private write(
    context: CanvasRenderingContext2D,
    word: Word,
    style: LabelStyle,
    text: string,
  ): void {
    const { pixelRatio } = this;
    const letters = this.dress(context, style, text, pixelRatio);
    context.globalCompositeOperation = 'lighter';
    context.textBaseline = 'middle';
    context.lineJoin = 'round';
    context.lineWidth = 2 * HALO_PX * pixelRatio;
    context.strokeStyle = '#0f0';
    context.fillStyle = '#f00';
    const x = word.left + MARGIN_PX * pixelRatio;
    const y = word.top + Math.round(word.height / 2) + 0.5;
    context.strokeText(letters, x, y);
    context.fillText(letters, x, y);
  }

  /** Sets the type and gives the text as it is to be set. */
  private dress(
    context: CanvasRenderingContext2D,
    style: LabelStyle,
    text: string,
    pixelRatio: number,
  ): string {
    const { weight, sizePx, family } = LABEL_FONTS[style];
    context.font = `${weight} ${sizePx * pixelRatio}px ${family}`;
    context.letterSpacing = style === 'name' ? `${NAME_SPACING_PX * pixelRatio}px` : '0px';
    return style === 'name' ? text.toUpperCase() : text;
  }
}
