/** Colours of a theme by role. Every text colour stands on `paper`, `raised` and `lit` with at least 4.5:1. */
export interface ThemeTokens {
  readonly paper: string;
  /** Drawers, menus, drop zone. */
  readonly raised: string;
  /** Row of the selected site. */
  readonly lit: string;
  /** Row under the pointer. */
  readonly hovered: string;
  readonly ink: string;
  readonly soft: string;
  readonly hairline: string;
  /** Borders of things that can be operated: at least 3:1. */
  readonly line: string;
  readonly accent: string;
  readonly onAccent: string;
  readonly error: string;
  readonly warning: string;
}

export const lightTokens: ThemeTokens = {
  paper: '#faf8f3',
  raised: '#f3efe5',
  lit: '#fbead7',
  hovered: '#f5f0e4',
  ink: '#26241f',
  soft: '#655f54',
  hairline: '#ddd7ca',
  line: '#8b8475',
  accent: '#0b6a6a',
  onAccent: '#ffffff',
  error: '#a3262a',
  warning: '#86480a',
};

export const darkTokens: ThemeTokens = {
  paper: '#1b1a18',
  raised: '#26241f',
  lit: '#3d3020',
  hovered: '#24221d',
  ink: '#ece7dc',
  soft: '#b3ab9c',
  hairline: '#3d392f',
  line: '#857d6e',
  accent: '#66c6c0',
  onAccent: '#0e2423',
  error: '#f59a94',
  warning: '#e6ad6a',
};

/** Custom properties of a theme as one declaration list: `--paper: #faf8f3; …`. */
export function declarations(tokens: ThemeTokens): string {
  return Object.entries(tokens)
    .map(([name, value]) => `--${name.replace(/[A-Z]/g, (letter) => `-${letter.toLowerCase()}`)}: ${value};`)
    .join(' ');
}
