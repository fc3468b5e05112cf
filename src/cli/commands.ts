import yargs from 'yargs';
import { UsageError } from './errors.js';

/** A command as chosen and parsed, to be run. */
export type Chosen =
  | { readonly kind: 'text'; readonly text: string }
  | { readonly kind: 'run'; readonly run: () => Promise<void> };

interface OptionNote {
  readonly type: 'string' | 'boolean';
  readonly describe: string;
  readonly default?: string | boolean;
  readonly choices?: readonly string[];
  readonly demandOption?: boolean;
}

interface CommandNote {
  readonly usage: string;
  readonly describe: string;
  readonly examples: readonly string[];
  readonly positional: { readonly name: string; readonly describe: string; readonly default?: string };
  readonly options: Readonly<Record<string, OptionNote>>;
  readonly run: (argv: Readonly<Record<string, unknown>>) => Promise<void>;
}

const JSON_OPTION: OptionNote = {
  type: 'boolean',
  describe: 'print everything as JSON, and nothing else',
  default: false,
};
const BOAT = { name: 'boat', describe: 'boat file (YAML); "-" reads standard input' };

const text = (v: unknown): string | undefined => (v === undefined ? undefined : String(v));

/** Every command: what it is called, what it takes, what it runs. Heavy parts are loaded when a command runs. */
const COMMANDS: Readonly<Record<string, CommandNote>> = {
  polar: {
    usage: 'polar <boat>',
    describe: 'predict the polar; print the targets, write table, results and page',
    examples: [
      'polarwright polar boats/keelboat.yaml',
      'polarwright polar mine.yaml --tws 6,10,14 --twa 40:180:10 --out tables',
      'polarwright polar mine.yaml --json > mine.json',
    ],
    positional: BOAT,
    options: {
      tws: { type: 'string', describe: 'true wind speeds, kn: a list 4,6,8 or a range from:to:step 4:20:2' },
      twa: { type: 'string', describe: 'true wind angles from the course, deg: likewise' },
      out: { type: 'string', describe: 'folder to write to', default: 'reports' },
      json: { ...JSON_OPTION, describe: 'print the results as JSON, and write no files' },
      quiet: { type: 'boolean', describe: 'write the files, print nothing', default: false },
      decimals: { type: 'string', describe: 'decimals of speeds, 0 to 6 (2 in tables, 3 in the CSV)' },
    },
    run: async (argv) => {
      const { polarCommand } = await import('./polar-command.js');
      polarCommand({
        boat: String(argv.boat),
        tws: text(argv.tws),
        twa: text(argv.twa),
        out: String(argv.out),
        json: argv.json === true,
        quiet: argv.quiet === true,
        decimals: text(argv.decimals),
      });
    },
  },
  explain: {
    usage: 'explain <boat>',
    describe: 'show every force and moment at one state',
    examples: [
      'polarwright explain boats/keelboat.yaml --tws 12 --twa 45',
      'polarwright explain mine.yaml --tws 12 --twa 45 --json',
    ],
    positional: BOAT,
    options: {
      tws: { type: 'string', describe: 'true wind speed, kn', demandOption: true },
      twa: { type: 'string', describe: 'true wind angle from the course, deg', demandOption: true },
      json: JSON_OPTION,
    },
    run: async (argv) => {
      const { explainCommand } = await import('./explain-command.js');
      explainCommand({
        boat: String(argv.boat),
        tws: String(argv.tws),
        twa: String(argv.twa),
        json: argv.json === true,
      });
    },
  },
  check: {
    usage: 'check <boat>',
    describe: 'read a boat file; show what follows from it, estimates and warnings',
    examples: ['polarwright check boats/keelboat.yaml', 'polarwright check mine.yaml --json'],
    positional: BOAT,
    options: { json: JSON_OPTION },
    run: async (argv) => {
      const { checkCommand } = await import('./check-command.js');
      checkCommand({ boat: String(argv.boat), json: argv.json === true });
    },
  },
  new: {
    usage: 'new [file]',
    describe: 'write a boat file to start from',
    examples: [
      'polarwright new mine.yaml',
      'polarwright new mine.yaml --kind keelboat',
      'polarwright new - | polarwright check -',
    ],
    positional: {
      name: 'file',
      describe: 'file to write; "-" is standard output',
      default: 'boat.yaml',
    },
    options: {
      kind: {
        type: 'string',
        describe: 'kind of boat',
        choices: ['dinghy', 'keelboat'],
        default: 'dinghy',
      },
      force: { type: 'boolean', describe: 'replace the file if there is one', default: false },
    },
    run: async (argv) => {
      const { newCommand } = await import('./new-command.js');
      newCommand({
        file: String(argv.file),
        kind: argv.kind === 'keelboat' ? 'keelboat' : 'dinghy',
        force: argv.force === true,
      });
    },
  },
};

/** Options every command knows. */
const COMMON = ['help', 'version'] as const;
const SHORT: Readonly<Record<string, string>> = { h: 'help' };

const examples = (lines: readonly string[]): string => `Examples:\n${lines.map((l) => `  ${l}`).join('\n')}`;

/** Suggests the nearest known name. Loaded only when something is wrong. */
async function suggestion(word: string, known: readonly string[]): Promise<string> {
  const { nearest } = await import('../units/index.js');
  const near = nearest(word, known);
  return near === undefined ? '' : near;
}

/** Looks the words over before they are parsed: commands and options that do not exist, options given twice. */
async function lookOver(argv: readonly string[]): Promise<void> {
  const end = argv.indexOf('--');
  const words = end < 0 ? argv : argv.slice(0, end);
  const name = words.find((w, i) => !w.startsWith('-') && !isValue(words, i));
  const wantsNothing = words.some((w) => w === '--help' || w === '-h' || w === '--version');
  if (name === undefined) {
    if (!wantsNothing)
      throw new UsageError('name a command: polar, explain, check or new', 'polarwright --help');
  } else if (!Object.hasOwn(COMMANDS, name)) {
    const near = await suggestion(name, Object.keys(COMMANDS));
    const hint = near === '' ? `there are ${Object.keys(COMMANDS).join(', ')}` : `did you mean ${near}?`;
    throw new UsageError(`there is no command "${name}"; ${hint}`, 'polarwright --help');
  }
  const command = name === undefined ? undefined : COMMANDS[name];
  const options = command?.options ?? {};
  const known = [...Object.keys(options), ...COMMON];
  const help = name === undefined ? 'polarwright --help' : `polarwright ${name} --help`;
  const seen = new Set<string>();
  for (const word of words) {
    if (!/^-[^\d.]/.test(word)) continue;
    const long = word.startsWith('--');
    const given = word.replace(/^--?/, '').split('=', 1)[0]!;
    const option = long ? given : (SHORT[given] ?? given);
    if ((!long && SHORT[given] === undefined) || !known.includes(option)) {
      const near = await suggestion(given, known);
      const hint = near === '' ? '' : `; did you mean --${near}?`;
      throw new UsageError(`there is no option "${word.split('=', 1)[0]}"${hint}`, help);
    }
    if (seen.has(option)) throw new UsageError(`option --${option} is given twice`, help);
    seen.add(option);
  }
}

/** True where a word is the value of the option before it, such as 12 in `--tws 12`. */
function isValue(words: readonly string[], i: number): boolean {
  const before = words[i - 1];
  if (before === undefined || !before.startsWith('--') || before.includes('=')) return false;
  const option = before.slice(2);
  return Object.values(COMMANDS).some((c) => c.options[option]?.type === 'string');
}

/**
 * Parses the words of a command line (without the program's own name).
 * @throws UsageError on anything that is not understood
 */
export async function choose(argv: readonly string[], version: string): Promise<Chosen> {
  await lookOver(argv);
  let chosen: (() => Promise<void>) | undefined;
  const width = Math.min(100, process.stdout.columns ?? 100);
  const parser = yargs()
    .scriptName('polarwright')
    .locale('en')
    .usage(
      `${examples(Object.values(COMMANDS).map((c) => c.examples[0]!))}\n\nSpeeds of small sailboats, predicted from a boat file.\n\nUsage: polarwright <command> [options]`,
    )
    .parserConfiguration({
      'boolean-negation': false,
      'camel-case-expansion': false,
      'dot-notation': false,
      'parse-numbers': false,
      'parse-positional-numbers': false,
      'duplicate-arguments-array': false,
      'greedy-arrays': false,
      'short-option-groups': false,
    })
    .wrap(width)
    .exitProcess(false)
    .strict()
    .demandCommand(1)
    .help('help', 'show this help')
    .alias('help', 'h')
    .version('version', 'show the version', version)
    .epilogue(
      'Results go to standard output, messages to standard error; no colours are used. Exit codes: 0 fine, 2 something to put right in the command or the boat file, 1 internal failure.',
    )
    .fail(false);
  for (const command of Object.values(COMMANDS)) {
    parser.command(
      command.usage,
      command.describe,
      (y) => {
        y.usage(
          `${examples(command.examples)}\n\n${command.describe[0]!.toUpperCase()}${command.describe.slice(1)}.\n\nUsage: polarwright ${command.usage} [options]`,
        );
        y.positional(command.positional.name, {
          type: 'string',
          describe: command.positional.describe,
          ...(command.positional.default !== undefined && { default: command.positional.default }),
        });
        for (const [option, note] of Object.entries(command.options))
          y.option(option, {
            type: note.type,
            describe: note.describe,
            requiresArg: note.type === 'string',
            ...(note.default !== undefined && { default: note.default }),
            ...(note.choices && { choices: note.choices }),
            ...(note.demandOption && { demandOption: true }),
          });
        return y;
      },
      (parsed) => {
        chosen = () => command.run(parsed as Readonly<Record<string, unknown>>);
      },
    );
  }
  let shown = '';
  try {
    await parser.parseAsync([...argv], {}, (_error: unknown, _argv: unknown, output: string) => {
      shown = output;
    });
  } catch (error) {
    if (error instanceof UsageError) throw error;
    const named = argv.find((w) => Object.hasOwn(COMMANDS, w));
    const message = error instanceof Error ? error.message : String(error);
    throw new UsageError(
      message.replace(/\s*\n\s*/g, '; '),
      named === undefined ? 'polarwright --help' : `polarwright ${named} --help`,
    );
  }
  if (chosen !== undefined) return { kind: 'run', run: chosen };
  return { kind: 'text', text: shown };
}
