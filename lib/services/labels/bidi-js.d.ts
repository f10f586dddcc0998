/** The part of bidi-js that the labels use; the package brings no types. */
declare module 'bidi-js' {
  interface EmbeddingLevels {
    levels: Uint8Array;
  }
  interface Bidi {
    getEmbeddingLevels(text: string, direction?: 'ltr' | 'rtl'): EmbeddingLevels;
    getMirroredCharacter(character: string): string | null;
  }
  export default function bidiFactory(): Bidi;
}
