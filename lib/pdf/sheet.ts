import PDFDocument from 'pdfkit';
import { colour, type Face, faceNames, instead, page } from './look';
import { fontOf } from './sfnt';

export type Ink = { face?: Face; size?: number; colour?: string; align?: 'left' | 'right'; spacing?: number };
type Element = PDFKit.PDFStructureElement;
type Run = { text: string; face: Face };

/** What pdfkit keeps of an embedded font and its types leave out. */
type WithFont = { _font: { font: { hasGlyphForCodePoint(code: number): boolean } } };

/** A4 pages with our faces: lines of text that change face where a character is missing, rules, and a structure for screen readers. */
export class Sheet {
  readonly doc: PDFKit.PDFDocument;
  readonly root: Element;
  /** Where the next line may stand, from the top [pt]. */
  y: number = page.top;
  readonly #covered = new Map<string, boolean>();
  readonly #chunks: Buffer[] = [];
  readonly #ended: Promise<void>;

  constructor(info: { title: string; author: string; at: Date; language: string }) {
    this.doc = new PDFDocument({
      size: 'A4', margin: 0, bufferPages: true, pdfVersion: '1.7', tagged: true, lang: info.language, displayTitle: true,
      // None of pdfkit's own: a standard font is neither embedded nor has it our letters.
      font: '',
      info: { Title: info.title, Author: info.author, Producer: 'Fullfield', Creator: 'Fullfield', CreationDate: info.at, ModDate: info.at },
    });
    for (const face of faceNames) this.doc.registerFont(face, fontOf(face));
    this.root = this.doc.struct('Document');
    this.doc.addStructure(this.root);
    this.doc.on('data', (chunk: Buffer) => this.#chunks.push(chunk));
    this.#ended = new Promise((resolve) => this.doc.on('end', () => resolve()));
  }

  #has(face: Face, sign: string): boolean {
    const key = `${face}${sign}`;
    let known = this.#covered.get(key);
    if (known === undefined) {
      this.doc.font(face);
      known = (this.doc as unknown as WithFont)._font.font.hasGlyphForCodePoint(sign.codePointAt(0) ?? 0);
      this.#covered.set(key, known);
    }
    return known;
  }

  #runs(text: string, face: Face): Run[] {
    const runs: Run[] = [];
    for (const sign of text.normalize('NFC')) {
      const fits = instead[face].find((one) => this.#has(one, sign)) ?? face;
      const last = runs.at(-1);
      if (last?.face === fits) last.text += sign;
      else runs.push({ text: sign, face: fits });
    }
    return runs;
  }

  /** Width of a line [pt]. */
  width(text: string, { face = 'sans', size = 11.25, spacing = 0 }: Ink = {}): number {
    return this.#runs(text, face).reduce((sum, run) => sum + this.doc.font(run.face).fontSize(size).widthOfString(run.text, { characterSpacing: spacing }), 0);
  }

  /** One line on the baseline `y`; with `align: 'right'` it ends at `x`. */
  line(text: string, x: number, y: number, ink: Ink = {}): void {
    const { face = 'sans', size = 11.25, spacing = 0, align = 'left' } = ink;
    let at = align === 'right' ? x - this.width(text, ink) : x;
    for (const run of this.#runs(text, face)) {
      this.doc.font(run.face).fontSize(size).fillColor(ink.colour ?? colour.ink);
      const width = this.doc.widthOfString(run.text, { characterSpacing: spacing });
      this.doc.text(run.text, at, y, { lineBreak: false, baseline: 'alphabetic', characterSpacing: spacing });
      at += width;
    }
  }

  /** Breaks a text into lines of at most `width` [pt]; a word that is longer is broken within. */
  wrap(text: string, width: number, ink: Ink = {}): string[] {
    const lines: string[] = [];
    let open = '';
    const put = (word: string) => {
      const longer = open === '' ? word : `${open} ${word}`;
      if (this.width(longer, ink) <= width) open = longer;
      else {
        if (open !== '') lines.push(open);
        open = word;
        while (this.width(open, ink) > width) {
          let fits = open.length - 1;
          while (fits > 1 && this.width(open.slice(0, fits), ink) > width) fits -= 1;
          lines.push(open.slice(0, fits));
          open = open.slice(fits);
        }
      }
    };
    text.split(' ').forEach(put);
    return open === '' && lines.length > 0 ? lines : [...lines, open];
  }

  rule(y: number, weight: number, tone: string, from: number = page.edge, to: number = page.width - page.edge): void {
    this.ornament(() => this.doc.moveTo(from, y).lineTo(to, y).lineWidth(weight).stroke(tone));
  }

  /** What is only to be looked at: rules, frames, running feet. */
  ornament(draw: () => void): void {
    this.doc.markContent('Artifact', { type: 'Layout' });
    draw();
    this.doc.endMarkedContent();
  }

  /** What is read, under its structure tag. */
  tagged(tag: string, parent: Element, draw: () => void): void {
    const content = this.doc.markStructureContent(tag);
    draw();
    this.doc.endMarkedContent();
    parent.add(this.doc.struct(tag, {}, content));
  }

  /** A structure element around others; closed when `fill` is done. */
  group(tag: string, parent: Element, fill: (element: Element) => void): void {
    const element = this.doc.struct(tag);
    parent.add(element);
    fill(element);
    element.end();
  }

  /** Goes to a new page when less than `height` [pt] is left on this one. */
  need(height: number): void {
    if (this.y + height <= page.height - page.bottom) return;
    this.doc.addPage();
    this.y = page.top + 12;
  }

  /** Puts a foot on every page: left as given, right "page n of m". */
  foot(left: string): void {
    const { start, count } = this.doc.bufferedPageRange();
    for (let at = 0; at < count; at += 1) {
      this.doc.switchToPage(start + at);
      this.ornament(() => {
        const ink: Ink = { size: 9.75, colour: colour.soft };
        this.line(left, page.edge, page.height - 36, ink);
        this.line(`page ${at + 1} of ${count}`, page.width - page.edge, page.height - 36, { ...ink, align: 'right' });
      });
    }
  }

  async bytes(): Promise<Buffer> {
    this.root.end();
    this.doc.end();
    await this.#ended;
    return Buffer.concat(this.#chunks);
  }
}
