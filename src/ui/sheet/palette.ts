// Owns the theme's colours as the canvas needs them, read from the style sheet's variables.
// Must not know what is drawn with them, or stores.
import { makeDivergingMap, makeSequentialMap, parseColour, type ColourMap, type Theme } from './colour-map.ts';

export interface Palette {
  readonly theme: Theme;
  readonly paper: string;
  readonly sheet: string;
  readonly ink: string;
  readonly soft: string;
  readonly line: string;
  readonly hair: string;
  readonly accent: string;
  readonly accentInk: string;
  readonly metal: string;
  readonly warn: string;
  /** The sheet's colour, see-through, under text that crosses the field. */
  readonly halo: string;
  /** The paper's colour without any opacity, for fading. */
  readonly paperClear: string;
  /** Tint of dielectrics, "r g b". */
  readonly dielectric: string;
  readonly dielectricLine: string;
  readonly diverging: ColourMap;
  readonly sequential: ColourMap;
}

/** `read` gives the value of a custom property, e.g. `--paper`. */
export function makePalette(read: (name: string) => string, theme: Theme): Palette {
  const sheet = parseColour(read('--sheet'));
  const paper = parseColour(read('--paper'));
  return {
    theme,
    paper: read('--paper'),
    sheet: read('--sheet'),
    ink: read('--ink'),
    soft: read('--soft'),
    line: read('--line'),
    hair: read('--hair'),
    accent: read('--accent'),
    accentInk: read('--accent-ink'),
    metal: read('--metal'),
    warn: read('--warn'),
    halo: `rgb(${sheet.join(' ')} / 0.78)`,
    paperClear: `rgb(${paper.join(' ')} / 0)`,
    dielectric: theme === 'light' ? '128 118 158' : '150 140 184',
    dielectricLine: theme === 'light' ? '#6f688c' : '#a79fc6',
    diverging: makeDivergingMap(sheet, theme),
    sequential: makeSequentialMap(sheet, theme),
  };
}
