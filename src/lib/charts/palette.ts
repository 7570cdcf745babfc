/** The design's colour tokens, as colours or as references to them. */
export interface Palette {
  paper: string;
  ink: string;
  ink2: string;
  ink3: string;
  above: string;
  below: string;
  solid: string;
  rule2: string;
  attn: string;
  stop: string;
  range: string;
  wash: string;
  rule: string;
}

export type Theme = 'light' | 'dark';

export const lightPalette: Palette = {
  paper: '#F4F6F1',
  ink: '#11201B',
  ink2: '#43524B',
  ink3: '#5C6A63',
  above: '#BC4A14',
  below: '#0F6170',
  solid: '#74837B',
  rule2: '#738179',
  attn: '#7A5200',
  stop: '#8A2348',
  range: '#DDE4DB',
  wash: '#E9EDE6',
  rule: '#CDD5CB',
};

export const darkPalette: Palette = {
  paper: '#0E1714',
  ink: '#E7EDE7',
  ink2: '#B4C0B9',
  ink3: '#93A199',
  above: '#F08F56',
  below: '#55B7C4',
  solid: '#84938B',
  rule2: '#6E7E76',
  attn: '#E0B04C',
  stop: '#F29AB2',
  range: '#22302B',
  wash: '#17221E',
  rule: '#2A3833',
};

export const palettes: Record<Theme, Palette> = { light: lightPalette, dark: darkPalette };

/** For charts inside a page: the page's custom properties, so that they follow its theme. */
export const cssPalette: Palette = {
  paper: 'var(--paper)',
  ink: 'var(--ink)',
  ink2: 'var(--ink-2)',
  ink3: 'var(--ink-3)',
  above: 'var(--above)',
  below: 'var(--below)',
  solid: 'var(--solid)',
  rule2: 'var(--rule-2)',
  attn: 'var(--attn)',
  stop: 'var(--stop)',
  range: 'var(--range)',
  wash: 'var(--wash)',
  rule: 'var(--rule)',
};
