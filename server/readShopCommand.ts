import { parseArgs } from 'node:util';
import { newShop, type NewShop } from './modules/shops/newShop';

const USAGE = `Makes a shop and its first admin:

  npm run shop -- create --name "Thistle Row Engines" --prefix TR --time-zone Europe/London \\
    --admin "Ada Merrow" --email ada@thistle-row.example

Without DATABASE_URL and APP_SECRET it takes those of \`npm start\` on this machine, which must be running.`;

const OPTIONS = {
  name: { type: 'string' },
  prefix: { type: 'string' },
  'time-zone': { type: 'string' },
  admin: { type: 'string' },
  email: { type: 'string' },
} as const;
const FLAGS: Record<keyof NewShop, string> = {
  name: '--name',
  prefix: '--prefix',
  timeZone: '--time-zone',
  admin: '--admin',
  email: '--email',
};

/** What whoever typed the command has to put right, in a sentence. */
export class Refusal extends Error {}

const valuesOf = (args: string[]) => {
  try {
    return parseArgs({ args, options: OPTIONS, allowPositionals: false }).values;
  } catch (error) {
    throw new Refusal(`Nothing was made. ${error instanceof Error ? error.message : String(error)}\n\n${USAGE}`);
  }
};

/** Reads `create --name …`; throws a `Refusal` that names every option that is missing or does not do. */
export const readShopCommand = (args: string[]): NewShop => {
  const [command, ...rest] = args;
  if (command !== 'create') throw new Refusal(USAGE);
  const { 'time-zone': timeZone, ...values } = valuesOf(rest);
  const parsed = newShop.safeParse({ ...values, timeZone });
  if (parsed.success) return parsed.data;
  const fields = [...new Set(parsed.error.issues.map(({ path }) => path[0] as keyof NewShop))];
  const given: Record<keyof NewShop, string | undefined> = {
    name: '',
    prefix: '',
    admin: '',
    email: '',
    ...values,
    timeZone,
  };
  const lines = fields.map((field) => {
    const said = given[field] ? `"${given[field]}" does not do` : 'is missing';
    return `${FLAGS[field]} ${said}. ${newShop.shape[field].description ?? ''}`;
  });
  throw new Refusal(`Nothing was made.\n${lines.join('\n')}`);
};
