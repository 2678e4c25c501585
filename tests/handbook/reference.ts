import { readFileSync } from 'node:fs';

/** A check value of the reference sheet: where it comes from, and whether it was read there or is from memory. */
export interface ReferenceRow {
  id: string;
  source: string;
  status: 'read' | 'memory';
  confidence?: number;
}

type File = 'units' | 'vin' | 'sequences' | 'worked_examples';

/** One file of tests/handbook/data, a copy of the project's reference sheet. */
export function referenceFile<T>(file: File): T {
  return JSON.parse(readFileSync(new URL(`./data/${file}.json`, import.meta.url), 'utf8')) as T;
}

/** A row of worked_examples.json by its id. Throws where the sheet has none. */
export function workedExample<Inputs, Expected>(id: string): ReferenceRow & { inputs: Inputs; expected: Expected } {
  type Row = ReferenceRow & { inputs: Inputs; expected: Expected };
  const row = referenceFile<{ rows: Row[] }>('worked_examples').rows.find((one) => one.id === id);
  if (!row) throw new Error(`The reference sheet has no ${id}`);
  return row;
}

/** What a test's name says of a value: id, status and source. */
export function provenance({ id, status, confidence, source }: ReferenceRow): string {
  const sureness = status === 'memory' && confidence !== undefined ? `, confidence ${confidence}` : '';
  return `${id} (${status}${sureness}): ${source}`;
}
