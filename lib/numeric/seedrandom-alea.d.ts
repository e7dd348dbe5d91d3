declare module 'seedrandom/lib/alea.js' {
  /** seedrandom's alea: a generator of numbers in [0, 1), seeded by a text. */
  export default function alea(seed: string): () => number;
}
