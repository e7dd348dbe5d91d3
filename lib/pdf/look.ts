import path from 'node:path';

/** Colours of the light theme, on white paper. */
export const colour = { ink: '#1A1F1C', soft: '#545F59', rule: '#D8D2C2', strong: '#8C8674', enamel: '#1C5B4B', glyptal: '#9C1F1A' } as const;

const faces = {
  sans: 'IBMPlexSans-Regular', medium: 'IBMPlexSans-Medium', bold: 'IBMPlexSans-SemiBold',
  cond: 'IBMPlexSansCondensed-Medium', head: 'IBMPlexSansCondensed-SemiBold', mono: 'IBMPlexMono-Regular', figures: 'IBMPlexMono-SemiBold',
} as const;
export type Face = keyof typeof faces;

// WOFF: from WOFF2 pdfkit makes blank glyphs without an error.
export const fontFile = (face: Face): string => path.join(process.cwd(), 'fonts', `${faces[face]}.woff`);
export const faceNames = Object.keys(faces) as Face[];

/** Faces tried in turn where one lacks a character: Plex Mono has no Ω or φ, Plex Sans has. */
export const instead: Record<Face, readonly Face[]> = {
  sans: ['sans', 'mono'], medium: ['medium', 'sans', 'mono'], bold: ['bold', 'sans', 'mono'], cond: ['cond', 'sans', 'mono'],
  head: ['head', 'bold', 'sans', 'mono'], mono: ['mono', 'sans'], figures: ['figures', 'bold', 'sans'],
};

export const page = { width: 595.28, height: 841.89, edge: 45, top: 39, bottom: 60 } as const;
