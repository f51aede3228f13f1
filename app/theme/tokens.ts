/**
 * Colours, type and spacing of the desk: the one file of tokens.
 *
 * CSS reads them as custom properties (`applyTheme` sets them on the root element), the 3-D scenes,
 * the charts and the plate read the same objects. Colour is meaning and only meaning.
 */

export interface Palette {
  /** The sheet everything is drawn on. */
  ground: string;
  /** A sheet laid on the ground: panels, inputs. */
  sheet: string;
  /** Text and main lines. */
  ink: string;
  /** Secondary text; still AA on ground and sheet. */
  inkSoft: string;
  /** Hairlines that carry no meaning. */
  hairline: string;
  /** The object and everything that is its own: path, uncertainty, flags. */
  object: string;
  earth: string;
  moon: string;
  sun: string;
  /** Other planets: ink, softened. */
  planet: string;
  /** Focus ring. */
  focus: string;
}

export const PAPER: Palette = {
  ground: '#f3ebdb',
  sheet: '#fbf6ea',
  ink: '#2b2520',
  inkSoft: '#5f554a',
  hairline: '#c9bda6',
  object: '#b02f16',
  earth: '#3a5577',
  moon: '#66635d',
  sun: '#8f5f0b',
  planet: '#7a6f61',
  focus: '#3a5577',
};

export const NIGHT: Palette = {
  ground: '#14171d',
  sheet: '#1c2028',
  ink: '#ebe2cf',
  inkSoft: '#b3a994',
  hairline: '#454a54',
  object: '#ff7f61',
  earth: '#93b3dc',
  moon: '#b9b5ab',
  sun: '#e3b050',
  planet: '#9b937f',
  focus: '#93b3dc',
};

export const FONT_TEXT = '"IBM Plex Serif", Georgia, serif';
export const FONT_FIGURES = '"IBM Plex Mono", ui-monospace, monospace';

/** Steps of spacing, px. */
export const SPACE = [0, 4, 8, 12, 16, 24, 32, 48] as const;

/** Sets the palette and the type as custom properties on an element (the page's root). */
export function applyTheme(element: HTMLElement, palette: Palette): void {
  for (const [name, value] of Object.entries(palette)) {
    const property = name.replace(/[A-Z]/g, (letter) => `-${letter.toLowerCase()}`);
    element.style.setProperty(`--${property}`, value);
  }
  element.style.setProperty('--font-text', FONT_TEXT);
  element.style.setProperty('--font-figures', FONT_FIGURES);
}
