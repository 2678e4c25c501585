/** Colours of the light theme as printed (tokens.css), by their names there. */
export const ink = {
  ink: '#12181c',
  ink2: '#3d4a52',
  ink3: '#56636b',
  sheet: '#ffffff',
  line: '#cfd6d4',
  line2: '#e3e8e5',
  steel: '#3b4850',
  steel2: '#56646d',
  paint: '#f4c21f',
  petrol: '#0b5f6b',
  petrolWash: '#dcecee',
  off: '#b03306',
  doubt: '#6d4396',
} as const;

/** The faces that are embedded, in full: Latin subsets lack ≥ and Ω. */
export type Face = 'text' | 'textSemi' | 'textBold' | 'figures' | 'figuresSemi' | 'figuresBold';

/** How a text is set. Sizes and leading in points. */
export interface Style {
  face: Face;
  size: number;
  color: string;
  leading: number;
}

const style = (face: Face, size: number, color: string, leading = size * 1.3): Style => ({
  face,
  size,
  color,
  leading,
});

/** Every style of the page at its full size; `scaled` makes all of them smaller together. */
export const styles = {
  title: style('textBold', 18.5, ink.ink, 21),
  number: style('figuresBold', 12, ink.ink, 15),
  shop: style('text', 9.4, ink.ink2, 12),
  claim: style('text', 12.4, ink.ink, 16.6),
  claimStrong: style('textBold', 12.4, ink.petrol, 16.6),
  label: style('text', 9.2, ink.ink3, 13.4),
  value: style('textSemi', 9.2, ink.ink, 13.4),
  code: style('figuresSemi', 9, ink.ink, 13.4),
  heading: style('textBold', 9.9, ink.ink, 13),
  head: style('text', 8.2, ink.ink3, 10.2),
  headStrong: style('textSemi', 8.2, ink.ink2, 10.2),
  cell: style('text', 8.4, ink.ink, 10.8),
  figure: style('figures', 8.4, ink.ink, 10.8),
  tiny: style('text', 6.9, ink.ink3, 8.6),
  tinyOff: style('textSemi', 6.9, ink.off, 8.6),
  tinySteel: style('textSemi', 6.9, ink.steel, 8.6),
  small: style('text', 8.1, ink.ink3, 10.6),
  signer: style('text', 9.4, ink.ink, 12.4),
  foot: style('text', 7.6, ink.ink3, 10),
  footCode: style('figures', 7.2, ink.ink3, 10),
  stamp: style('textBold', 10.5, ink.off, 13.6),
} as const;

/** Name of a style. */
export type StyleName = keyof typeof styles;

/** A style at a share of its size. */
export function scaled(name: StyleName, scale: number): Style {
  const { face, size, color, leading } = styles[name];
  return { face, size: size * scale, color, leading: leading * scale };
}
