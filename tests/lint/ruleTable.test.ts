import fs from 'node:fs';
import path from 'node:path';
import ts from 'typescript';
import { describe, expect, it } from 'vitest';

/*
 * Holds the table in tests/README.md to its word: every rule and fault that is built has a row, and every row names a test
 * that is there and runs.
 */

const root = path.resolve(import.meta.dirname, '../..');
const numbered = (letter: string, count: number): string[] =>
  Array.from({ length: count }, (_, index) => `${letter}${index + 1}`);
const RULES = [
  ...numbered('W', 13),
  ...numbered('R', 12),
  ...numbered('J', 7),
  ...numbered('P', 5),
  ...['K1', 'K2', 'K6'],
  ...numbered('D', 3),
];
const FAULTS = [1, 2, 4, 5, 6, 7, 8, 9, 16, 17, 22, 23, 24].map((number) => `fault ${number}`);

interface Row {
  id: string;
  file: string;
  title: string;
}

/** Cells of a row of a Markdown table, as they read. */
const cellsOf = (line: string): string[] =>
  line
    .split(/(?<!\\)\|/)
    .slice(1, -1)
    .map((cell) => cell.trim().replace(/\\(?=[^\w\s])/g, ''));

/** Rows of every table of the file whose first cell is a rule or a fault. */
const rowsOf = (markdown: string): Row[] =>
  markdown
    .split('\n')
    .filter((line) => /^\| (?:[A-Z]\d+|fault \d+) +\|/.test(line))
    .map((line) => {
      const [id = '', file = '', title = ''] = cellsOf(line);
      return { id, file: file.replaceAll('`', ''), title };
    });

const GROUPS = new Set(['describe', 'it', 'test']);
const NOT_RUN = new Set(['skip', 'todo', 'fixme', 'fails']);

/** The words a call chain goes through: `it.each(…)(…)` gives it, each. */
const chainOf = (node: ts.Expression): string[] => {
  if (ts.isIdentifier(node)) return [node.text];
  if (ts.isPropertyAccessExpression(node)) return [...chainOf(node.expression), node.name.text];
  return ts.isCallExpression(node) ? chainOf(node.expression) : [];
};

/** Titles of the tests of a file, and of their groups, as written; those that are skipped are left out with all they hold. */
const titlesIn = (source: string): Set<string> => {
  const titles = new Set<string>();
  const visit = (node: ts.Node): void => {
    if (ts.isCallExpression(node)) {
      const [head = '', ...rest] = chainOf(node.expression);
      if (GROUPS.has(head)) {
        if (rest.some((word) => NOT_RUN.has(word))) return;
        const [title] = node.arguments;
        if (title && ts.isStringLiteralLike(title)) titles.add(title.text);
      }
    }
    ts.forEachChild(node, visit);
  };
  visit(ts.createSourceFile('test.ts', source, ts.ScriptTarget.Latest));
  return titles;
};

/** What is wrong with a row, or null. */
const problemOf = ({ id, file, title }: Row, titlesOf: (file: string) => Set<string> | null): string | null => {
  if (file === '' || title === '') return `${id}: an empty row`;
  const titles = titlesOf(file);
  if (titles === null) return `${id}: there is no ${file}`;
  return titles.has(title) ? null : `${id}: ${file} has no test "${title}"`;
};

const readFile = (file: string): string | null => {
  const found = path.join(root, file);
  return /\.(test|e2e)\.ts$/.test(file) && fs.existsSync(found) ? fs.readFileSync(found, 'utf8') : null;
};

/** Each file is parsed once, though many rows name it. */
const parsed = new Map<string, Set<string> | null>();
const titlesOfFile = (file: string): Set<string> | null => {
  const known = parsed.get(file);
  if (known !== undefined) return known;
  const source = readFile(file);
  const titles = source === null ? null : titlesIn(source);
  parsed.set(file, titles);
  return titles;
};

const rows = rowsOf(fs.readFileSync(path.join(root, 'tests/README.md'), 'utf8'));

describe('the table of rules and their tests', () => {
  it.each([...RULES, ...FAULTS])('has a row for %s', (id) => {
    expect(rows.filter((row) => row.id === id)).not.toEqual([]);
  });

  it('names only tests that are there', () => {
    expect(rows.map((row) => problemOf(row, titlesOfFile)).filter((problem) => problem !== null)).toEqual([]);
  });

  it('says nothing twice', () => {
    const said = rows.map(({ id, file, title }) => `${id} ${file} ${title}`);
    expect(said.filter((one, index) => said.indexOf(one) !== index)).toEqual([]);
  });
});

describe('the reader of the table', () => {
  const source = `
    describe('a group', () => {
      it('runs', () => undefined);
      it.each([1])('runs with %i', () => undefined);
      it.skip('is skipped', () => undefined);
      it.todo('is to come');
      test.step(\`a step\`, () => undefined);
      other('is no test', () => undefined);
    });
    describe.skip('a skipped group', () => { it('never runs', () => undefined); });`;

  it('finds what runs, and nothing that is skipped', () => {
    expect([...titlesIn(source)]).toEqual(['a group', 'runs', 'runs with %i', 'a step']);
  });

  it('sees an empty row, a missing file and a missing title', () => {
    const titlesOf = (file: string) => (file === 'a.test.ts' ? titlesIn(source) : null);
    const table = [
      '| W1 | `a.test.ts` | runs |',
      '| W2 | `a.test.ts` | |',
      '| W3 | `b.test.ts` | runs |',
      '| W4 | `a.test.ts` | is skipped |',
      '| fault 2 | `a.test.ts` | runs with %i |',
      '| what | no rule | at all |',
    ].join('\n');
    expect(rowsOf(table).map((row) => problemOf(row, titlesOf))).toEqual([
      null,
      'W2: an empty row',
      'W3: there is no b.test.ts',
      'W4: a.test.ts has no test "is skipped"',
      null,
    ]);
  });

  it('reads a cell as it reads on the page', () => {
    expect(rowsOf('| R1 | `a.test.ts` | this \\| that, \\*not mine\\* |')).toEqual([
      { id: 'R1', file: 'a.test.ts', title: 'this | that, *not mine*' },
    ]);
  });
});
