import { phraseRuns, styleOf, type Block, type PageSource } from '../block';
import type { Run } from '../paper';

/** The first paragraph: what is known, and every deviation (D1). */
export function claimBlock(source: PageSource, width: number): Block {
  const { paper, document } = source;
  const space: Run = { text: ' ', style: styleOf(source, 'claim') };
  const runs = document.sheet.claim.flatMap((phrase, index) => [
    ...(index === 0 ? [] : [space]),
    ...phraseRuns(source, phrase, 'claim', 'claimStrong'),
  ]);
  const text = paper.wrap(runs, Math.min(width, 500));
  return { height: text.height, draw: (x, y) => paper.leaf('P', () => paper.drawBlock(text, x, y)) };
}
