import { say, sayRich, type Phrase, type Speaker } from '@shared/proof/phrase';
import type { ProofDocument } from '@shared/proof/proofDocument';
import type { SideSheet } from '@shared/proof/sideSheet';
import { scaled, type Style, type StyleName } from './ink';
import type { Paper, Run, TextBlock } from './paper';

/** What every block is drawn from. */
export interface PageSource {
  paper: Paper;
  document: ProofDocument;
  side: SideSheet;
  speaker: Speaker;
  /** Share of the full type size: a long record is set a little smaller before it takes a second page. */
  scale: number;
}

/** Something with a known height that can be drawn anywhere. */
export interface Block {
  height: number;
  draw(x: number, y: number): void;
}

/** A style at the page's scale. */
export const styleOf = (source: PageSource, name: StyleName): Style => scaled(name, source.scale);

/** A text in one style, broken for a width. */
export const textBlock = (source: PageSource, text: string, name: StyleName, width: number): TextBlock =>
  source.paper.wrap([{ text, style: styleOf(source, name) }], width);

/** A phrase as runs: what it says strongly in the strong style. */
export function phraseRuns(source: PageSource, phrase: Phrase, plain: StyleName, strong: StyleName): Run[] {
  const styles = { plain: styleOf(source, plain), strong: styleOf(source, strong) };
  return sayRich(phrase, source.speaker).map(({ text, strong: isStrong }) => ({
    text,
    style: isStrong ? styles.strong : styles.plain,
  }));
}

/** A phrase as plain text in the page's language. */
export const spoken = (source: PageSource, phrase: Phrase): string => say(phrase, source.speaker);

/** Blocks one under the other with a gap between them; those of no height take no gap. */
export function stacked(blocks: readonly Block[], gap: number): Block {
  const shown = blocks.filter(({ height }) => height > 0);
  const height = shown.reduce((sum, block) => sum + block.height, 0) + gap * Math.max(0, shown.length - 1);
  return {
    height,
    draw: (x, y) => {
      let top = y;
      for (const block of shown) {
        block.draw(x, top);
        top += block.height + gap;
      }
    },
  };
}

/** Blocks beside each other, each with its distance from the left edge. */
export function beside(parts: readonly { x: number; block: Block }[]): Block {
  return {
    height: Math.max(0, ...parts.map(({ block }) => block.height)),
    draw: (x, y) => {
      for (const part of parts) part.block.draw(x + part.x, y);
    },
  };
}

/** Nothing. */
export const emptyBlock: Block = { height: 0, draw: () => undefined };
