import PDFDocument from 'pdfkit';
import { drawable, fontFiles } from './fontFiles';
import { ink, type Face, type Style } from './ink';

/** Paper sizes in points. */
export const PAPER = { letter: [612, 792], a4: [595.28, 841.89] } as const;
/** Name of a paper size. */
export type PaperSize = keyof typeof PAPER;

/** A text in one style; several make a line. */
export interface Run {
  text: string;
  style: Style;
}

interface PlacedRun extends Run {
  x: number;
}

/** A text broken into lines for a width. */
export interface TextBlock {
  lines: { runs: PlacedRun[]; width: number }[];
  leading: number;
  height: number;
}

type Structure = PDFKit.PDFStructureElement;
interface Glyphs {
  _font: { font: { hasGlyphForCodePoint(codePoint: number): boolean } };
}

/** Figures are set a little closer than the face has them. */
const tracking = (style: Style): number => (style.face.startsWith('figures') ? -0.03 * style.size : 0);

/**
 * A page to draw on: breaks and places text by itself, so that what was measured is what is drawn, and hangs everything
 * into the structure tree that a screen reader follows. What is no content is an artifact.
 */
export class Paper {
  readonly doc: PDFKit.PDFDocument;
  readonly width: number;
  readonly height: number;
  private readonly parents: Structure[] = [];

  constructor(size: PaperSize, options: PDFKit.PDFDocumentOptions) {
    this.doc = new PDFDocument({ ...options, size: [...PAPER[size]], margin: 0, autoFirstPage: false });
    [this.width, this.height] = PAPER[size];
    for (const [face, file] of Object.entries(fontFiles())) this.doc.registerFont(face, file);
  }

  private use(style: Style): void {
    this.doc.font(style.face).fontSize(style.size);
  }

  /** The text as this face can draw it. */
  private safe(text: string, face: Face): string {
    this.doc.font(face);
    const { font } = (this.doc as unknown as Glyphs)._font;
    return drawable(text, (codePoint) => font.hasGlyphForCodePoint(codePoint));
  }

  /** Width of a text on one line. */
  widthOf(text: string, style: Style): number {
    const safe = this.safe(text, style.face);
    this.use(style);
    return this.doc.widthOfString(safe, { characterSpacing: tracking(style) });
  }

  /** Pieces between which a line may break; a piece wider than the line is cut where it must be. */
  private pieces(run: Run, width: number): Run[] {
    const words = run.text.split(/(?<= )/);
    return words.flatMap((text) => {
      if (this.widthOf(text.trimEnd(), run.style) <= width) return [{ ...run, text }];
      const cut: Run[] = [];
      let part = '';
      for (const character of text) {
        if (part !== '' && this.widthOf(part + character, run.style) > width) {
          cut.push({ ...run, text: part });
          part = '';
        }
        part += character;
      }
      return [...cut, { ...run, text: part }];
    });
  }

  /** Breaks runs into lines. */
  wrap(runs: readonly Run[], width: number): TextBlock {
    const lines: TextBlock['lines'] = [];
    let line: PlacedRun[] = [];
    let x = 0;
    const close = (): void => {
      const last = line.at(-1);
      const end = last ? last.x + this.widthOf(last.text.trimEnd(), last.style) : 0;
      lines.push({ runs: line, width: end });
      [line, x] = [[], 0];
    };
    for (const piece of runs.flatMap((run) => this.pieces(run, width))) {
      if (line.length > 0 && x + this.widthOf(piece.text.trimEnd(), piece.style) > width + 0.01) close();
      const last = line.at(-1);
      if (last && last.style === piece.style) last.text += piece.text;
      else line.push({ ...piece, x });
      const tail = line.at(-1);
      x = tail ? tail.x + this.widthOf(tail.text, tail.style) : x;
    }
    if (line.length > 0) close();
    const leading = Math.max(0, ...runs.map(({ style }) => style.leading));
    return { lines, leading, height: lines.length * leading };
  }

  /** Draws a broken text with its top left corner at x, y. */
  drawBlock(block: TextBlock, x: number, y: number, width = 0, align: 'left' | 'right' | 'center' = 'left'): void {
    for (const [index, { runs, width: used }] of block.lines.entries()) {
      const shift = align === 'right' ? width - used : align === 'center' ? (width - used) / 2 : 0;
      for (const run of runs) this.line(run.text, run.style, x + shift + run.x, y + index * block.leading);
    }
  }

  /** Draws one line of text as it is; y is the top of its line box. */
  line(text: string, style: Style, x: number, y: number): void {
    const safe = this.safe(text, style.face);
    this.use(style);
    // Ascent 0.984 and descent 0.316 of these faces make a box of 1.3 em; the rest of the leading goes above.
    const top = y + (style.leading - style.size * 1.3) / 2;
    this.doc.fillColor(style.color).text(safe, x, top, { lineBreak: false, characterSpacing: tracking(style) });
  }

  /** Opens the structure tree, and with it the document. */
  root(lang: string): void {
    const root = this.doc.struct('Document', { lang });
    this.doc.addStructure(root);
    this.parents.push(root);
  }

  /** A part of the structure with parts of its own: a table, a row, a section. */
  group(type: string, content: () => void, options: object = {}): void {
    const element = this.doc.struct(type, options);
    this.parents.at(-1)?.add(element);
    this.parents.push(element);
    content();
    this.parents.pop();
    element.end();
  }

  /** A part of the structure that holds content on this page. */
  leaf(type: string, draw: () => void, options: object = {}): void {
    const element = this.doc.struct(type, options);
    this.parents.at(-1)?.add(element);
    element.add(draw);
    element.end();
  }

  /** Something that says nothing: a rule, a ground. */
  artifact(draw: () => void): void {
    this.doc.markContent('Artifact', { type: 'Layout' });
    draw();
    this.doc.endMarkedContent();
  }

  /** A straight line across. */
  rule(x: number, y: number, width: number, color: string = ink.line, thickness = 0.75): void {
    this.artifact(() => {
      this.doc.save();
      this.doc.lineWidth(thickness).strokeColor(color);
      this.doc
        .moveTo(x, y)
        .lineTo(x + width, y)
        .stroke();
      this.doc.restore();
    });
  }
}
