import { phrase } from '@shared/proof/phrase';
import { beside, emptyBlock, spoken, stacked, textBlock, type Block, type PageSource } from './block';
import { claimBlock } from './blocks/claimBlock';
import { factsBlock } from './blocks/factsBlock';
import { footBlock } from './blocks/footBlock';
import { deviationsBlock, linesBlock } from './blocks/linesBlock';
import { mapBlock } from './blocks/mapBlock';
import { notesBlock, preparationBlock } from './blocks/paragraphBlock';
import { readingTablePlan } from './blocks/readingsBlock';
import { signaturesBlock } from './blocks/signaturesBlock';
import { continuedBlock, stampBlock, topBlock } from './blocks/topBlock';
import { wrenchesBlock } from './blocks/wrenchesBlock';
import { flowReadings } from './flowReadings';
import { FlowPages, type Placed } from './flowPages';

/** White round the page, in points. */
export const MARGIN = { x: 39, top: 33, bottom: 34 };
/** Smaller than this nobody reads it on paper; then a second page is taken. */
const SCALES = [1, 0.96, 0.92, 0.88, 0.84];
const GUTTER = 15;
const MAP_HEIGHT = 168;

/** What is said about the proof today, above everything else. */
export type Stamps = readonly string[];

const widthOf = ({ paper }: PageSource): number => paper.width - 2 * MARGIN.x;
const columnIndexes = ({ document }: PageSource): number[] => document.sheet.columns.map((_, index) => index);

function head(source: PageSource, stamps: Stamps): Block {
  const width = widthOf(source);
  const blocks = [
    ...stamps.map((text) => stampBlock(source, text, width)),
    topBlock(source, width),
    claimBlock(source, width),
    factsBlock(source, width),
  ];
  return stacked(blocks, 8.5 * source.scale);
}

/** What was found and decided: never left off page 1 (D1). */
const deviations = (source: PageSource, width: number): Block => deviationsBlock(source, width);

/** What was voided and changed: on page 1 with the deviations. */
const changes = (source: PageSource, width: number): Block =>
  linesBlock(source, 'sheet.changes', source.document.sheet.changes, width);

/** What is read only when somebody wants to know more. */
function annex(source: PageSource, width: number): Block[] {
  const { earlier, late } = source.document.sheet;
  return [
    linesBlock(source, 'sheet.earlier', earlier, width),
    linesBlock(source, 'sheet.late', late, width),
    preparationBlock(source, width),
    notesBlock(source, width),
  ];
}

/** Map, wrenches and findings on the left, the readings on the right, as long as the columns fit there. */
function twoColumns(source: PageSource): Block | null {
  const width = widthOf(source);
  const table = readingTablePlan(source, columnIndexes(source), source.document.sheet.rows);
  const right = Math.min(Math.max(table.needs, Math.min(table.wishes, width * 0.5)), width * 0.56);
  if (table.needs > right) return null;
  const left = width - right - GUTTER;
  const gap = 7 * source.scale;
  const column = [mapBlock(source, left, MAP_HEIGHT * source.scale), wrenchesBlock(source, left)];
  // Under whichever column is shorter, so that one page holds more.
  const arrangements = [
    [stacked([...column, deviations(source, left), changes(source, left)], gap), table.block(right)],
    [stacked([...column, deviations(source, left)], gap), stacked([table.block(right), changes(source, right)], gap)],
    [stacked(column, gap), stacked([table.block(right), deviations(source, right), changes(source, right)], gap)],
  ].map(([one, other]) =>
    beside([
      { x: 0, block: one ?? emptyBlock },
      { x: left + GUTTER, block: other ?? emptyBlock },
    ]),
  );
  return arrangements.reduce((best, block) => (block.height < best.height ? block : best));
}

/** Map beside wrenches, and the readings under them over the whole width. */
function overWhole(source: PageSource): Block | null {
  const width = widthOf(source);
  const table = readingTablePlan(source, columnIndexes(source), source.document.sheet.rows);
  if (table.needs > width) return null;
  const half = (width - GUTTER) / 2;
  const upper = beside([
    { x: 0, block: mapBlock(source, half, 120 * source.scale) },
    { x: half + GUTTER, block: wrenchesBlock(source, half) },
  ]);
  return stacked([upper, table.block(width), deviations(source, width), changes(source, width)], 8 * source.scale);
}

function single(source: PageSource, stamps: Stamps, body: (source: PageSource) => Block | null): Placed[] | null {
  const main = body(source);
  if (!main) return null;
  const width = widthOf(source);
  const gap = 9 * source.scale;
  const upper = stacked([head(source, stamps), main, ...annex(source, width)], gap);
  return page1(source, upper);
}

/** Signatures and foot stand at the bottom of page 1; null where the rest does not leave them room. */
function page1(source: PageSource, upper: Block): Placed[] | null {
  const { paper } = source;
  const width = widthOf(source);
  const signatures = signaturesBlock(source, width);
  const foot = footBlock(source, width);
  const footTop = paper.height - MARGIN.bottom - foot.height;
  const signTop = MARGIN.top + upper.height + 15;
  if (signTop + signatures.height + 8 > footTop) return null;
  // Close under what it signs, with a little air where there is some.
  const spare = footTop - signTop - signatures.height - 8;
  return [
    { block: upper, x: MARGIN.x, y: MARGIN.top },
    { block: signatures, x: MARGIN.x, y: signTop + Math.min(10, spare) },
    { block: foot, x: MARGIN.x, y: footTop },
  ];
}

/** Heights the map is tried in on the first of several pages, where there is often room for a large one. */
const MAP_HEIGHTS = [330, 290, 250, 210, MAP_HEIGHT];

interface FirstPage {
  /** Height the map may take; 0 moves it to the next page. */
  mapHeight: number;
  /** Deviations that stand on page 1; all of them but in a record that no page could hold. */
  told: number;
}

function firstOfMany(
  source: PageSource,
  stamps: Stamps,
  pagesAfter: number,
  { mapHeight, told }: FirstPage,
): Placed[] | null {
  const width = widthOf(source);
  const half = (width - GUTTER) / 2;
  const more = textBlock(source, spoken(source, phrase('sheet.readingsOn', { n: pagesAfter })), 'cell', half);
  const note: Block = {
    height: more.height,
    draw: (x, y) => source.paper.leaf('P', () => source.paper.drawBlock(more, x, y)),
  };
  const right = stacked([wrenchesBlock(source, half), note], 8 * source.scale);
  const map = mapHeight > 0 ? mapBlock(source, half, mapHeight * source.scale) : emptyBlock;
  const upper = beside([
    { x: 0, block: map },
    { x: mapHeight > 0 ? half + GUTTER : 0, block: right },
  ]);
  const { length } = source.document.sheet.deviations;
  const shown = Math.min(told, length);
  const cut = length > 8 ? Math.ceil(shown / 2) : shown;
  const found =
    cut < shown
      ? beside([
          { x: 0, block: deviationsBlock(source, half, 0, cut) },
          { x: half + GUTTER, block: deviationsBlock(source, half, cut, shown) },
        ])
      : deviationsBlock(source, width, 0, shown);
  return page1(source, stacked([head(source, stamps), upper, found, changes(source, width)], 9 * source.scale));
}

/** The pages after the first: the readings, then everything else; what page 1 could not hold comes before both. */
function pagesAfter(source: PageSource, { mapHeight, told }: FirstPage): Placed[][] {
  const width = widthOf(source);
  const pages = new FlowPages(source, () => continuedBlock(source, width), MARGIN);
  if (told < source.document.sheet.deviations.length) pages.add(deviationsBlock(source, width, told));
  if (mapHeight === 0) pages.add(mapBlock(source, width, 260));
  flowReadings(source, pages, width);
  for (const block of annex(source, width)) pages.add(block);
  return pages.done();
}

function many(source: PageSource, stamps: Stamps, first: FirstPage): Placed[][] | null {
  const after = pagesAfter({ ...source, scale: 1 }, first);
  const page = firstOfMany(source, stamps, after.length, first);
  return page && [page, ...after];
}

/**
 * Puts everything on its page. One page where it fits, a little smaller rather than on two; else page 1 keeps what was
 * claimed, found and signed, and the readings follow.
 */
export function composePages(source: PageSource, stamps: Stamps): Placed[][] {
  for (const scale of SCALES) {
    const page = single({ ...source, scale }, stamps, twoColumns) ?? single({ ...source, scale }, stamps, overWhole);
    if (page) return [page];
  }
  const all = source.document.sheet.deviations.length;
  for (const scale of SCALES) {
    for (const mapHeight of MAP_HEIGHTS) {
      const pages = many({ ...source, scale }, stamps, { mapHeight, told: all });
      if (pages) return pages;
    }
  }
  const least = SCALES.at(-1) ?? 1;
  for (let told = all; told >= 0; told -= 1) {
    const pages = many({ ...source, scale: least }, stamps, { mapHeight: 0, told });
    if (pages) return pages;
  }
  throw new Error('page 1 cannot hold even its head');
}
