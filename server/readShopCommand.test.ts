import { describe, expect, it } from 'vitest';
import { readShopCommand, Refusal } from './readShopCommand';

const wanted = {
  name: 'Thistle Row Engines',
  prefix: 'TR',
  'time-zone': 'Europe/London',
  admin: 'Ada Merrow',
  email: 'ada@thistle-row.example',
};
const argsOf = (options: Record<string, string>) =>
  Object.entries(options).flatMap(([name, value]) => [`--${name}`, value]);

const refusalOf = (args: string[]): string => {
  try {
    readShopCommand(args);
  } catch (error) {
    if (error instanceof Refusal) return error.message;
    throw error;
  }
  return 'not refused';
};

describe('the command that makes a shop', () => {
  it('is read whole', () => {
    expect(readShopCommand(['create', ...argsOf(wanted)])).toEqual({
      name: 'Thistle Row Engines',
      prefix: 'TR',
      timeZone: 'Europe/London',
      admin: 'Ada Merrow',
      email: 'ada@thistle-row.example',
    });
  });

  it.each([
    ['an empty name', { name: ' ' }, '--name " " does not do. The shop\'s name: 1 to 120 characters.'],
    ['a prefix in small letters', { prefix: 'tr' }, '--prefix "tr" does not do. The prefix begins every proof number'],
    ['a time zone that is none', { 'time-zone': 'Mars/Base' }, '--time-zone "Mars/Base" does not do.'],
    ['an abbreviation of one', { 'time-zone': 'EST' }, '--time-zone "EST" does not do.'],
    ['a name with half a character', { admin: '\uD83D' }, '--admin "\uD83D" does not do.'],
    ['an address that is none', { email: 'ada@' }, '--email "ada@" does not do.'],
    ['an option nobody knows', { colour: 'blue' }, "Unknown option '--colour'"],
  ])('is refused with %s, in a sentence', (_name, change, sentence) => {
    const said = refusalOf(['create', ...argsOf({ ...wanted, ...change })]);
    expect(said).toMatch(/^Nothing was made\./);
    expect(said).toContain(sentence);
  });

  it.each(['UTC', 'America/Argentina/Ushuaia', 'Asia/Kolkata'])('takes the time zone %s', (name) => {
    expect(readShopCommand(['create', ...argsOf({ ...wanted, 'time-zone': name })]).timeZone).toBe(name);
  });

  it('names every option that is missing', () => {
    expect(refusalOf(['create', '--name', 'Only a name']).match(/--[a-z-]+ is missing/g)).toEqual([
      ...['--prefix is missing', '--time-zone is missing', '--admin is missing', '--email is missing'],
    ]);
  });

  it.each([[[]], [['destroy']]])('without one it knows shows how it is used: %j', (args) => {
    expect(refusalOf(args)).toContain('npm run shop -- create --name');
  });
});
