import { headGeometry, type HeadState } from '@shared/geometry/heads';
import { layoutMap, type MapLayout } from '@shared/geometry/layout';
import { phrase, word } from '@shared/proof/phrase';
import { proofHeadState, proofMapSpec } from '@shared/proof/proofMap';
import { spoken, type Block, type PageSource } from '../block';
import { ink, type Style } from '../ink';

/** Points per drawing unit: numbers of 16 units, the least a head carries, print at 5.6 points. */
const UNIT = 0.35;

type Doc = PDFKit.PDFDocument;

const FILLS: Partial<Record<HeadState['fill'], string>> = { in: ink.petrol, accepted: ink.steel2 };

function layoutFor(source: PageSource, width: number, mostHeight: number): MapLayout {
  const spec = proofMapSpec(source.document);
  const units = { width: width / UNIT, height: mostHeight / UNIT };
  const box = { ...units, lean: true };
  const first = layoutMap(spec, box);
  // What is left free above and below would only be white paper.
  const { outline } = first;
  const used = outline.kind === 'rectangle' ? outline.height : outline.radius * 2;
  const words = (spec.sides.top ? 30 : 4) + (spec.sides.bottom ? 30 : 4);
  return layoutMap(spec, { ...box, height: Math.min(units.height, used + words + 2) });
}

function drawCasting(source: PageSource, layout: MapLayout): void {
  const { doc } = source.paper;
  const { outline } = layout;
  doc.lineWidth(2.5).strokeColor(ink.line);
  if (outline.kind === 'rectangle')
    doc.roundedRect(outline.x, outline.y, outline.width, outline.height, outline.corner).stroke();
  else {
    doc.circle(outline.x, outline.y, outline.radius).stroke();
    if (outline.inner > 0) doc.circle(outline.x, outline.y, outline.inner).stroke();
  }
  for (const bore of layout.bores) doc.circle(bore.x, bore.y, bore.r).stroke();
  const style: Style = { face: 'text', size: 19, color: ink.ink3, leading: 24 };
  for (const side of layout.sides) {
    for (const [index, text] of side.lines.entries()) {
      const width = source.paper.widthOf(text, style);
      const shift = side.anchor === 'middle' ? width / 2 : side.anchor === 'end' ? width : 0;
      const down = (index - (side.anchor === 'middle' ? 0 : (side.lines.length - 1) / 2)) * 22;
      source.paper.line(text, style, side.x - shift, side.y + down - 18);
    }
  }
}

function stroke(doc: Doc, path: { path: string; width: number } | null, color: string): void {
  if (path) doc.path(path.path).lineWidth(path.width).strokeColor(color).stroke();
}

function drawMarks(source: PageSource, marks: ReturnType<typeof headGeometry>['marks']): void {
  const { doc } = source.paper;
  if (marks.flag) {
    const color = marks.flag.kind === 'lookAgain' ? ink.doubt : marks.flag.outlined ? ink.steel : ink.off;
    doc.save().translate(marks.flag.x, marks.flag.y);
    doc.path(marks.flag.path).lineWidth(2.5);
    if (marks.flag.outlined) doc.fillAndStroke(ink.sheet, color);
    else doc.fill(color);
    const { text, textY, outlined } = marks.flag;
    const size = 16;
    const style: Style = { face: 'figuresBold', size, color: outlined ? color : ink.sheet, leading: size * 1.3 };
    if (text) source.paper.line(text, style, -source.paper.widthOf(text, style) / 2, textY - size * 0.984);
    doc.restore();
  }
  if (!marks.tag) return;
  const { x, y, width, height, text } = marks.tag;
  const style: Style = { face: 'textBold', size: 17, color: ink.ink, leading: height };
  const wide = Math.max(width, source.paper.widthOf(text, style) + 10);
  doc
    .lineWidth(2.2)
    .roundedRect(x - wide / 2, y - height / 2, wide, height, 4)
    .fillAndStroke(ink.sheet, ink.ink);
  if (text) source.paper.line(text, style, x - source.paper.widthOf(text, style) / 2, y - height / 2);
}

function drawHead(source: PageSource, state: HeadState, radius: number, label: string): void {
  const { doc } = source.paper;
  const g = headGeometry(state, { radius, label, lean: true });
  stroke(doc, g.earlier, ink.steel2);
  stroke(doc, g.pass, ink.ink2);
  stroke(doc, g.ticks, ink.ink);
  const fill = FILLS[state.fill];
  doc.circle(0, 0, g.radius).lineWidth(g.disc.width);
  if (fill) doc.fillAndStroke(fill, fill);
  else doc.fillAndStroke(ink.sheet, ink.steel);
  if (g.stripe) {
    const { angle, x, y, width, height } = g.stripe;
    doc.save().rotate(angle).rect(x, y, width, height).lineWidth(1.6).fillAndStroke(ink.paint, ink.ink).restore();
  }
  if (g.label) {
    const color = fill ? ink.sheet : ink.ink;
    const style: Style = { face: 'figuresBold', size: g.label.size, color, leading: g.label.size * 1.3 };
    // Figures stand 0.668 em high on a baseline 0.984 em under the top of the line box.
    const top = g.label.size * (0.668 / 2 - 0.984);
    source.paper.line(label, style, -source.paper.widthOf(label, style) / 2, top);
  }
}

/** What somebody hears who does not see the map. */
function altOf(source: PageSource): string {
  const { document, speaker } = source;
  const states = document.procedure.document.holes.map(({ id, label }) => {
    const state = proofHeadState(document, id, '');
    const words = word(state.fill === 'accepted' ? 'cell.accepted' : 'verdict.in', speaker.language);
    const renewed = state.tag === undefined ? '' : `, ${word('legend.new', speaker.language)}`;
    return `${label}: ${words}${renewed}`;
  });
  return spoken(source, phrase('sheet.map', { states: `${states.join('; ')}.` }));
}

/** The joint as it was left, in vectors from the same geometry as on the stand. */
export function mapBlock(source: PageSource, width: number, mostHeight: number): Block {
  const { paper, document, speaker } = source;
  const layout = layoutFor(source, width, mostHeight);
  const height = layout.height * UNIT;
  const tag = word('map.new', speaker.language);
  return {
    height,
    draw: (x, y) => {
      const draw = (): void => {
        paper.doc.save().translate(x, y).scale(UNIT);
        drawCasting(source, layout);
        const heads = layout.holes.map((placed) => ({
          ...placed,
          state: proofHeadState(document, placed.hole.id, tag),
        }));
        for (const { x: left, y: top, hole, state } of heads) {
          paper.doc.save().translate(left, top);
          drawHead(source, state, layout.radius, hole.label);
          paper.doc.restore();
        }
        for (const { x: left, y: top, hole, state } of heads) {
          paper.doc.save().translate(left, top);
          drawMarks(source, headGeometry(state, { radius: layout.radius, label: hole.label, lean: true }).marks);
          paper.doc.restore();
        }
        paper.doc.restore();
      };
      paper.leaf('Figure', draw, { alt: altOf(source), bbox: [x, y, x + width, y + height], placement: 'Block' });
    },
  };
}
