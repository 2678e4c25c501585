import { word } from '@shared/proof/phrase';
import { noteLines } from '@shared/proof/proofText';
import type { PhraseKey } from '@shared/proof/words/en';
import { spoken, styleOf, type Block, type PageSource } from '../block';

/** A heading run into a paragraph of small type: things to be read only when somebody wants to know. */
function paragraph(source: PageSource, heading: PhraseKey, text: string, width: number): Block {
  const { paper, speaker } = source;
  if (text === '') return { height: 0, draw: () => undefined };
  const strong = { ...styleOf(source, 'small'), face: 'textSemi' as const };
  const runs = [
    { text: `${word(heading, speaker.language)} `, style: strong },
    { text, style: styleOf(source, 'small') },
  ];
  const block = paper.wrap(runs, width);
  return { height: block.height, draw: (x, y) => paper.leaf('P', () => paper.drawBlock(block, x, y)) };
}

/** The steps as they were answered (W2). */
export function preparationBlock(source: PageSource, width: number): Block {
  const steps = source.document.sheet.preparation.map((step) => spoken(source, step));
  return paragraph(source, 'sheet.preparation', steps.join(' · '), width);
}

/** What people wrote down, and how many photographs are kept. */
export function notesBlock(source: PageSource, width: number): Block {
  return paragraph(source, 'sheet.notes', noteLines(source.document, source.speaker).join(' · '), width);
}
