import { DataTexture, LinearFilter, RGFormat, UnsignedByteType, Vector2 } from 'three';
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
const CHANNELS = 2;
const HALO_PX = 1.75;
/** Room around a word in the atlas, px of the picture. */
const MARGIN_PX = 3;
const HEIGHT_PX = 17;

/** Where a word lies in the atlas, device pixels. */
interface Word {
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
}

export class Lettering {
  readonly texture: DataTexture;
  readonly size = new Vector2(ATLAS_WIDTH_PX, ATLAS_HEIGHT_PX);
  private readonly atlas = new Uint8Array(ATLAS_WIDTH_PX * ATLAS_HEIGHT_PX * CHANNELS);
  /** One word is written here, then copied into the atlas. */
  private readonly slip = document.createElement('canvas').getContext('2d', {
    willReadFrequently: true,
  });
  private readonly words = new Map<string, Word>();
  private readonly widths = new Map<string, number>();
  private pixelRatio = 1;
  private left = 0;
  private top = 0;

  constructor() {
    this.texture = new DataTexture(
      this.atlas,
      ATLAS_WIDTH_PX,
      ATLAS_HEIGHT_PX,
      RGFormat,
      UnsignedByteType,
    );
    this.texture.minFilter = LinearFilter;
    this.texture.magFilter = LinearFilter;
    this.texture.needsUpdate = true;
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
    const { slip } = this;
    if (known !== undefined || slip === null) return known ?? 0;
    const width = slip.measureText(dress(slip, style, text, 1)).width;
    this.widths.set(key, width);
    return width;
  }

  /** The word in the atlas, written there if it is new. */
  word(style: LabelStyle, text: string): Word | null {
    const key = `${style} ${text}`;
    const known = this.words.get(key);
    const { slip, pixelRatio } = this;
    if (known !== undefined || slip === null) return known ?? null;
    const wanted = Math.ceil((this.width(style, text) + 2 * MARGIN_PX) * pixelRatio);
    const width = Math.min(ATLAS_WIDTH_PX, wanted);
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
    this.copy(write(slip, word, style, text, pixelRatio), word);
    this.texture.needsUpdate = true;
    return word;
  }

  /** Forgets everything: the type has arrived, or the atlas is full. */
  clear(): void {
    this.words.clear();
    this.widths.clear();
    this.left = 0;
    this.top = 0;
  }

  dispose(): void {
    this.texture.dispose();
  }

  private copy(pixels: Uint8ClampedArray, word: Word): void {
    for (let y = 0; y < word.height; y++) {
      let to = CHANNELS * ((word.top + y) * ATLAS_WIDTH_PX + word.left);
      for (let from = 4 * y * word.width; from < 4 * (y + 1) * word.width; from += 4) {
        this.atlas[to++] = pixels[from];
        this.atlas[to++] = pixels[from + 1];
      }
    }
  }
}

/** Writes a word on the slip: letters in red, the clearing in green, on black. */
function write(
  slip: CanvasRenderingContext2D,
  { width, height }: Word,
  style: LabelStyle,
  text: string,
  pixelRatio: number,
): Uint8ClampedArray {
  // A canvas is wiped, and forgets its settings, when its size is set.
  slip.canvas.width = width;
  slip.canvas.height = height;
  slip.fillStyle = '#000';
  slip.fillRect(0, 0, width, height);
  const letters = dress(slip, style, text, pixelRatio);
  slip.globalCompositeOperation = 'lighter';
  slip.textBaseline = 'middle';
  slip.lineJoin = 'round';
  slip.lineWidth = 2 * HALO_PX * pixelRatio;
  slip.strokeStyle = '#0f0';
  slip.fillStyle = '#f00';
  const x = MARGIN_PX * pixelRatio;
  const y = Math.round(height / 2) + 0.5;
  slip.strokeText(letters, x, y);
  slip.fillText(letters, x, y);
  return slip.getImageData(0, 0, width, height).data;
}

/** Sets the type and gives the text as it is to be set. */
function dress(
  slip: CanvasRenderingContext2D,
  style: LabelStyle,
  text: string,
  pixelRatio: number,
): string {
  const { weight, sizePx, family } = LABEL_FONTS[style];
  slip.font = `${weight} ${sizePx * pixelRatio}px ${family}`;
  slip.letterSpacing = style === 'name' ? `${NAME_SPACING_PX * pixelRatio}px` : '0px';
  return style === 'name' ? text.toUpperCase() : text;
}
