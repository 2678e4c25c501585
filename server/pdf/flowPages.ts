import type { Block, PageSource } from './block';

/** A block with its place on a page. */
export interface Placed {
  block: Block;
  x: number;
  y: number;
}

const GAP = 12;

/** Fills page after page from the top, each under a short head. */
export class FlowPages {
  private readonly pages: Placed[][] = [];
  private y = 0;

  constructor(
    private readonly source: PageSource,
    private readonly headOf: () => Block,
    private readonly margin: { x: number; top: number; bottom: number },
  ) {}

  private open(): void {
    const head = this.headOf();
    this.pages.push([{ block: head, x: this.margin.x, y: this.margin.top }]);
    this.y = this.margin.top + head.height + GAP;
  }

  private get bottom(): number {
    return this.source.paper.height - this.margin.bottom;
  }

  /** Height left on the page under way; that of a fresh one where none is open. */
  left(): number {
    if (this.pages.length === 0) this.open();
    return this.bottom - this.y;
  }

  /** Goes to a fresh page. */
  turn(): void {
    this.open();
  }

  /** Puts a block under the last one, on a fresh page where it does not fit. A block of no height is left out. */
  add(block: Block): void {
    if (block.height === 0) return;
    if (this.left() < block.height && (this.pages.at(-1)?.length ?? 0) > 1) this.open();
    this.pages.at(-1)?.push({ block, x: this.margin.x, y: this.y });
    this.y += block.height + GAP;
  }

  done(): Placed[][] {
    return this.pages;
  }
}
