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
  /** What may follow the first word, any number of times. */
  readonly rest?: { readonly name: string; readonly describe: string };
  readonly options: Readonly<Record<string, OptionNote>>;
  readonly run: (argv: Readonly<Record<string, unknown>>) => Promise<void>;
}

/** How "-" (standard input or output) passes through the parser, which takes it for an option. */
const STANDARD = '\u0001standard';

const JSON_OPTION: OptionNote = {
  type: 'boolean',
  describe: 'print everything as JSON, and nothing else',
  default: false,
};
const BOAT = { name: 'boat', describe: 'boat file (YAML); "-" reads standard input' };

const text = (v: unknown): string | undefined => (v === undefined ? undefined : String(v));
const courseArguments = (argv: Readonly<Record<string, unknown>>) => ({
  course: text(argv.course),
  tacks: text(argv.tacks),
  tackCost: text(argv['tack-cost']),
  gybes: text(argv.gybes),
  gybeCost: text(argv['gybe-cost']),
});
const file = (v: unknown): string => (v === STANDARD ? '-' : String(v));

/** How a delimited table is written. */
const TABLE_OPTIONS: Readonly<Record<string, OptionNote>> = {
  delimiter: { type: 'string', describe: 'comma, semicolon, tab, bar, blank, or one character' },
  'decimal-mark': { type: 'string', describe: 'mark of decimals', choices: ['point', 'comma'] },
  'wind-unit': { type: 'string', describe: 'unit of wind speeds', choices: ['kn', 'm/s', 'km/h'] },
  'speed-unit': { type: 'string', describe: 'unit of boat speeds', choices: ['kn', 'm/s', 'km/h'] },
  'angle-unit': { type: 'string', describe: 'unit of angles', choices: ['deg', 'rad'] },
};
const tableWords = (argv: Readonly<Record<string, unknown>>) => ({
  delimiter: text(argv.delimiter),
  decimalMark: text(argv['decimal-mark']),
  windUnit: text(argv['wind-unit']),
  speedUnit: text(argv['speed-unit']),
  angleUnit: text(argv['angle-unit']),
});
const COURSE_OPTIONS: Readonly<Record<string, OptionNote>> = {
  course: {
    type: 'string',
    describe:
      'windward-leeward, triangle, right-triangle, trapezoid, upwind, reach, downwind, circle, or legs as deg=share: 0=50,120=25,120=25',
  },
  wind: {
    type: 'string',
    describe:
      'kn: a list 6,10,14; shares 6=20,10=50,14=30; "weibull 11 2" (mean, shape); or a file of observations',
  },
  tacks: { type: 'string', describe: 'tacks per nautical mile on legs that are tacked' },
  'tack-cost': { type: 'string', describe: 'seconds that a tack costs' },
  gybes: { type: 'string', describe: 'gybes per nautical mile on legs that are gybed' },
  'gybe-cost': { type: 'string', describe: 'seconds that a gybe costs' },
};
const WORKERS: OptionNote = { type: 'string', describe: 'worker threads (one for every core)' };

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
        boat: file(argv.boat),
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
      'polarwright explain mine.yaml --tws 12 --twa 45 --heel 8 --crew-mass 83',
      'polarwright explain mine.yaml --tws 12 --twa 45 --json',
    ],
    positional: BOAT,
    options: {
      tws: { type: 'string', describe: 'true wind speed, kn', demandOption: true },
      twa: { type: 'string', describe: 'true wind angle from the course, deg', demandOption: true },
      heel: { type: 'string', describe: 'hold her at this heel, deg (to windward negative)' },
      crew: { type: 'string', describe: 'hold the crew at this share of fully out, -1 to 1' },
      ease: { type: 'string', describe: 'give up this share of the heeling moment, 0 to 0.95' },
      board: { type: 'string', describe: 'hold this share of the board down' },
      sails: { type: 'string', describe: 'keep to the sail set of this name' },
      'crew-mass': { type: 'string', describe: 'sail with a crew of this mass together, kg' },
      out: { type: 'string', describe: 'folder to write a page with a sketch of the balance to' },
      json: JSON_OPTION,
    },
    run: async (argv) => {
      const { explainCommand } = await import('./explain-command.js');
      explainCommand({
        boat: file(argv.boat),
        tws: String(argv.tws),
        twa: String(argv.twa),
        heel: text(argv.heel),
        crew: text(argv.crew),
        ease: text(argv.ease),
        board: text(argv.board),
        sails: text(argv.sails),
        crewMass: text(argv['crew-mass']),
        out: text(argv.out),
        json: argv.json === true,
      });
    },
  },
  compare: {
    usage: 'compare <boat> [variant..]',
    describe: 'rank variants of a boat on a course, with how sure it is',
    examples: [
      'polarwright compare mine.yaml',
      'polarwright compare mine.yaml "taller mast" other.yaml --course triangle --wind 6=20,10=50,14=30',
      'polarwright compare mine.yaml --wind "weibull 11 2" --draws 1000 --json',
    ],
    positional: BOAT,
    rest: {
      name: 'variant',
      describe: 'names from its variants:, files with differences, or boat files; none: all its variants',
    },
    options: {
      ...COURSE_OPTIONS,
      draws: { type: 'string', describe: 'paired draws of the uncertain constants; 0: none', default: '256' },
      seed: { type: 'string', describe: 'seed of the draws', default: '1' },
      workers: WORKERS,
      out: { type: 'string', describe: 'folder to write to', default: 'reports' },
      json: { ...JSON_OPTION, describe: 'print the results as JSON, and write no files' },
    },
    run: async (argv) => {
      const { compareCommand } = await import('./compare-command.js');
      await compareCommand({
        boat: file(argv.boat),
        variants: ((argv.variant ?? []) as readonly unknown[]).map(file),
        ...courseArguments(argv),
        wind: text(argv.wind),
        draws: String(argv.draws),
        seed: String(argv.seed),
        workers: text(argv.workers),
        out: String(argv.out),
        json: argv.json === true,
      });
    },
  },
  sensitivity: {
    usage: 'sensitivity <boat>',
    describe: 'show what a small change of each design quantity does to the time',
    examples: [
      'polarwright sensitivity boats/keelboat.yaml',
      'polarwright sensitivity mine.yaml --wind 5,12,20 --step 2',
    ],
    positional: BOAT,
    options: {
      wind: { type: 'string', describe: 'true wind speeds, kn', default: '6,16' },
      step: { type: 'string', describe: 'change of each quantity, %', default: '5' },
      workers: WORKERS,
      out: { type: 'string', describe: 'folder to write to', default: 'reports' },
      json: { ...JSON_OPTION, describe: 'print the results as JSON, and write no files' },
    },
    run: async (argv) => {
      const { sensitivityCommand } = await import('./sensitivity-command.js');
      await sensitivityCommand({
        boat: file(argv.boat),
        wind: String(argv.wind),
        step: String(argv.step),
        workers: text(argv.workers),
        out: String(argv.out),
        json: argv.json === true,
      });
    },
  },
  sweep: {
    usage: 'sweep <boat>',
    describe: 'time every variant of a grid on a course; goes on where it was stopped',
    examples: [
      'polarwright sweep mine.yaml --vary "rig.mast_height = 8 to 10 m in 5 steps; crew.count = 3 or 4"',
      'polarwright sweep mine.yaml --vary "sails.main.area = times 0.8 to 1.2 in 100 steps" --shard 3/8',
      'polarwright sweep mine.yaml --vary "sails.main.area = times 0.8 to 1.2 in 100 steps" --merge 8',
    ],
    positional: BOAT,
    options: {
      vary: {
        type: 'string',
        describe: 'keys and their values, axes of the grid separated by ";"',
        demandOption: true,
      },
      ...COURSE_OPTIONS,
      shard: { type: 'string', describe: 'do one part of several only, such as 3/8' },
      merge: { type: 'string', describe: 'join so many parts that are done' },
      restart: { type: 'boolean', describe: 'begin anew, whatever is there', default: false },
      workers: WORKERS,
      out: { type: 'string', describe: 'folder to write to', default: 'reports' },
    },
    run: async (argv) => {
      const { sweepCommand } = await import('./sweep-command.js');
      await sweepCommand({
        boat: file(argv.boat),
        vary: String(argv.vary),
        ...courseArguments(argv),
        wind: text(argv.wind),
        shard: text(argv.shard),
        merge: text(argv.merge),
        restart: argv.restart === true,
        workers: text(argv.workers),
        out: String(argv.out),
      });
    },
  },
  check: {
    usage: 'check <boat>',
    describe: 'read a boat file; show what follows from it, estimates and warnings',
    examples: [
      'polarwright check boats/keelboat.yaml',
      'polarwright check mine.yaml --plot reports',
      'polarwright check mine.yaml --json',
    ],
    positional: BOAT,
    options: {
      plot: {
        type: 'string',
        describe: 'folder to write a page with lines, section areas and righting arms to',
      },
      json: JSON_OPTION,
    },
    run: async (argv) => {
      const { checkCommand } = await import('./check-command.js');
      checkCommand({ boat: file(argv.boat), json: argv.json === true, plot: text(argv.plot) });
    },
  },
  sails: {
    usage: 'sails <boat>',
    describe: 'show what each sail set gives over apparent wind angle, and how it is loaded',
    examples: ['polarwright sails boats/keelboat.yaml', 'polarwright sails mine.yaml --out reports'],
    positional: BOAT,
    options: {
      out: { type: 'string', describe: 'folder to write a page and a table (CSV) to' },
      json: JSON_OPTION,
    },
    run: async (argv) => {
      const { sailsCommand } = await import('./sails-command.js');
      sailsCommand({ boat: file(argv.boat), json: argv.json === true, out: text(argv.out) });
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
        file: file(argv.file),
        kind: argv.kind === 'keelboat' ? 'keelboat' : 'dinghy',
        force: argv.force === true,
      });
    },
  },
  targets: {
    usage: 'targets <boat>',
    describe: 'target speeds for the coach: table, CSV, and cards for printing',
    examples: [
      'polarwright targets boats/keelboat.yaml',
      'polarwright targets mine.yaml --tws 6:18:2 --reach 60,90,120 --paper A6',
      'polarwright targets mine.yaml --unit m/s --sea-percent 96 --crew-percent 95 --label "first season"',
    ],
    positional: BOAT,
    options: {
      tws: { type: 'string', describe: 'true wind speeds, in the unit: a list 4,6,8 or a range 4:20:2' },
      reach: { type: 'string', describe: 'true wind angles for reaching, deg: likewise' },
      unit: { type: 'string', describe: 'unit of speeds', choices: ['kn', 'm/s'], default: 'kn' },
      'sea-percent': { type: 'string', describe: 'what the sea leaves of the predicted speed, %' },
      'crew-percent': { type: 'string', describe: 'what the crew get of the predicted speed, %' },
      label: { type: 'string', describe: 'a line of your own on every card' },
      paper: { type: 'string', describe: 'paper of the cards', choices: ['A5', 'A6'], default: 'A5' },
      percents: { type: 'boolean', describe: 'print the helper tables, percent of target', default: false },
      'boat-speed': { type: 'string', describe: 'print a boat speed in percent of every target' },
      decimals: { type: 'string', describe: 'decimals of speeds, 0 to 6 (2)' },
      out: { type: 'string', describe: 'folder to write to', default: 'reports' },
      json: { ...JSON_OPTION, describe: 'print the targets as JSON, and write no files' },
    },
    run: async (argv) => {
      const { targetsCommand } = await import('./targets-command.js');
      targetsCommand({
        boat: file(argv.boat),
        tws: text(argv.tws),
        reach: text(argv.reach),
        unit: argv.unit === 'm/s' ? 'm/s' : 'kn',
        seaPercent: text(argv['sea-percent']),
        crewPercent: text(argv['crew-percent']),
        label: text(argv.label),
        paper: argv.paper === 'A6' ? 'A6' : 'A5',
        decimals: text(argv.decimals),
        percents: argv.percents === true,
        boatSpeed: text(argv['boat-speed']),
        out: String(argv.out),
        json: argv.json === true,
      });
    },
  },
  export: {
    usage: 'export <boat>',
    describe: 'the complete speed table a router needs, as delimited text or Signal K',
    examples: [
      'polarwright export boats/keelboat.yaml',
      'polarwright export mine.yaml --shape signal-k --cap 25 --percent 95',
      'polarwright export mine.yaml --shape angles-across-tab --optimum --percent-by-wind 12:100,25:85',
    ],
    positional: BOAT,
    options: {
      shape: {
        type: 'string',
        describe: 'shape of the table',
        choices: [
          'angles-down',
          'angles-down-tab',
          'angles-down-semicolon',
          'angles-across',
          'angles-across-tab',
          'list',
          'signal-k',
        ],
        default: 'angles-down',
      },
      tws: { type: 'string', describe: 'true wind speeds to compute, in the wind unit: list or range' },
      twa: { type: 'string', describe: 'true wind angles, deg: list or range; 0 and 180 are added' },
      optimum: { type: 'boolean', describe: 'add the angles of best VMG of every wind', default: false },
      cap: { type: 'string', describe: 'count no more wind than this' },
      top: { type: 'string', describe: 'wind speed of a last row above the computed ones' },
      above: {
        type: 'string',
        describe: 'up to there: hold the speeds, or let them fade to zero',
        choices: ['hold', 'fade'],
        default: 'hold',
      },
      'no-go': {
        type: 'string',
        describe: 'speeds in the no-go zone: zero, or fading to zero at 0 deg',
        choices: ['zero', 'fade'],
        default: 'zero',
      },
      percent: { type: 'string', describe: 'what is left of the predicted speed, %' },
      'percent-by-wind': { type: 'string', describe: 'likewise by wind speed: 10:100,20:90' },
      ...TABLE_OPTIONS,
      header: { type: 'string', describe: 'text of the corner cell ("none": empty); for a list a,b,c' },
      'line-ends': { type: 'string', describe: 'line ends', choices: ['crlf', 'lf'] },
      decimals: { type: 'string', describe: 'decimals of boat speeds, 0 to 6 (2)' },
      out: { type: 'string', describe: 'folder to write to', default: 'reports' },
      print: { type: 'boolean', describe: 'print the table alone, and write no file', default: false },
    },
    run: async (argv) => {
      const { exportCommand } = await import('./export-command.js');
      exportCommand({
        boat: file(argv.boat),
        shape: String(argv.shape),
        tws: text(argv.tws),
        twa: text(argv.twa),
        optimum: argv.optimum === true,
        cap: text(argv.cap),
        top: text(argv.top),
        above: argv.above === 'fade' ? 'fade' : 'hold',
        noGo: argv['no-go'] === 'fade' ? 'fade' : 'zero',
        percent: text(argv.percent),
        percentByWind: text(argv['percent-by-wind']),
        ...tableWords(argv),
        header: text(argv.header),
        lineEnds: argv['line-ends'] === undefined ? undefined : argv['line-ends'] === 'lf' ? 'lf' : 'crlf',
        decimals: text(argv.decimals),
        out: String(argv.out),
        print: argv.print === true,
      });
    },
  },
  table: {
    usage: 'table <table>',
    describe: 'read a speed table from elsewhere, plot it, compare it with a boat',
    examples: [
      'polarwright table reports/keelboat-routing.csv',
      'polarwright table theirs.txt --boat boats/keelboat.yaml --wind-height "10 m"',
      'polarwright table theirs.txt --layout angles-across --delimiter tab --wind-unit m/s',
    ],
    positional: {
      name: 'table',
      describe: 'table of boat speeds: delimited text or Signal K; "-" reads standard input',
    },
    options: {
      boat: { type: 'string', describe: 'boat file whose prediction the table is compared with' },
      'wind-height': { type: 'string', describe: "height the table's wind is quoted at, such as 10 m" },
      layout: {
        type: 'string',
        describe: 'where the angles stand, if not guessed well',
        choices: ['angles-down', 'angles-across', 'list'],
      },
      ...TABLE_OPTIONS,
      out: { type: 'string', describe: 'folder to write to', default: 'reports' },
    },
    run: async (argv) => {
      const { tableCommand } = await import('./table-command.js');
      tableCommand({
        table: file(argv.table),
        boat: argv.boat === undefined ? undefined : file(argv.boat),
        windHeight: text(argv['wind-height']),
        layout: text(argv.layout),
        ...tableWords(argv),
        out: String(argv.out),
      });
    },
  },
};

/** Options every command knows. */
const COMMON = ['help', 'version'] as const;
const SHORT: Readonly<Record<string, string>> = { h: 'help' };

/** The help's layout takes blanks off the start of a line; these are put back as blanks. */
const INDENT = '\u0002\u0002';

const examples = (lines: readonly string[]): string =>
  `Examples:\n${lines.map((l) => `${INDENT}${l}`).join('\n')}`;

/** Suggests the nearest known name. Loaded only when something is wrong. */
async function suggestion(word: string, known: readonly string[]): Promise<string> {
  const { nearest } = await import('../units/index.js');
  const near = nearest(word, known);
  return near === undefined ? '' : near;
}

/** The words of a command line, looked over: every one is known to be understood. */
interface Words {
  readonly command: string | undefined;
  readonly words: readonly string[];
  /** What follows the command's first word, in order. */
  readonly rest: readonly string[];
}

/**
 * Looks the words over before they are parsed, so that a slip gets an answer that helps: commands and options that do
 * not exist, options given twice or without a value, files missing or too many. Words after "--" are files.
 */
async function lookOver(argv: readonly string[]): Promise<Words> {
  const end = argv.indexOf('--');
  const front = end < 0 ? argv : argv.slice(0, end);
  const rear = end < 0 ? [] : argv.slice(end + 1);
  const isOption = (word: string): boolean => /^-[^\d.]/.test(word);
  const wantsText = front.some((w) => w === '--help' || w === '-h' || w === '--version');

  const places: number[] = [];
  for (let i = 0; i < front.length; i++) {
    if (!isOption(front[i]!)) places.push(i);
    else if (takesValue(front[i]!)) i++;
  }
  const name = places.length > 0 ? front[places[0]!]! : rear[0];
  const help = 'polarwright --help';
  if (name === undefined) {
    if (!wantsText) throw new UsageError(`name a command: ${Object.keys(COMMANDS).join(', ')}`, help);
  } else if (!Object.hasOwn(COMMANDS, name)) {
    const near = await suggestion(name, Object.keys(COMMANDS));
    const hint = near === '' ? `there are ${Object.keys(COMMANDS).join(', ')}` : `did you mean ${near}?`;
    throw new UsageError(`there is no command "${name}"; ${hint}`, help);
  }
  const command = name === undefined ? undefined : COMMANDS[name];
  const ownHelp = name === undefined ? help : `polarwright ${name} --help`;
  await lookOverOptions(front, command?.options ?? {}, isOption, ownHelp);
  const files = [...places.map((i) => front[i]!), ...rear].slice(1);
  if (command !== undefined && !wantsText) {
    const { positional } = command;
    if (files.length > 1 && command.rest === undefined)
      throw new UsageError(`${name} takes one ${positional.name} only, not also "${files[1]}"`, ownHelp);
    if (files.length === 0 && positional.default === undefined)
      throw new UsageError(
        `${name}: name a ${positional.name === 'boat' ? 'boat file' : positional.name}, or "-" for standard input`,
        ownHelp,
      );
    for (const [option, note] of Object.entries(command.options)) {
      if (note.demandOption && !front.some((w) => w === `--${option}` || w.startsWith(`--${option}=`)))
        throw new UsageError(`${name}: --${option} is missing (${note.describe})`, ownHelp);
    }
  }
  const plain = (w: string): string => (w === '-' ? STANDARD : w);
  return {
    command: name,
    rest: files.slice(1),
    words: [
      ...front.map(plain),
      ...rear.map((w) => (w.length > 1 && w.startsWith('-') ? `./${w}` : plain(w))),
    ],
  };
}

async function lookOverOptions(
  words: readonly string[],
  options: Readonly<Record<string, OptionNote>>,
  isOption: (word: string) => boolean,
  help: string,
): Promise<void> {
  const known = [...Object.keys(options), ...COMMON];
  const seen = new Set<string>();
  for (let i = 0; i < words.length; i++) {
    const word = words[i]!;
    if (!isOption(word)) continue;
    const long = word.startsWith('--');
    const [given, ...values] = word.replace(/^--?/, '').split('=') as [string, ...string[]];
    const option = long ? given : SHORT[given];
    if (option === undefined || !known.includes(option)) {
      const near = given.length > 1 ? await suggestion(given, known) : '';
      const hint = near === '' ? '' : `; did you mean --${near}?`;
      throw new UsageError(`there is no option "${word.split('=', 1)[0]}"${hint}`, help);
    }
    if (seen.has(option)) throw new UsageError(`option --${option} is given twice`, help);
    seen.add(option);
    const note = options[option];
    if (note?.type !== 'string') {
      if (values.length > 0) throw new UsageError(`--${option} takes no value`, help);
      continue;
    }
    const value = values.length > 0 ? values.join('=') : words[++i];
    if (value === undefined || value.trim() === '' || (values.length === 0 && isOption(value)))
      throw new UsageError(`--${option} wants a value (${note.describe})`, help);
    if (note.choices && !note.choices.includes(value))
      throw new UsageError(`--${option}: "${value}" is none of ${note.choices.join(', ')}`, help);
  }
}

/** True where the word after an option is its value, such as 12 in `--tws 12`. */
function takesValue(word: string): boolean {
  if (!word.startsWith('--') || word.includes('=')) return false;
  return Object.values(COMMANDS).some((c) => c.options[word.slice(2)]?.type === 'string');
}

/**
 * Parses the words of a command line (without the program's own name).
 * @throws UsageError on anything that is not understood
 */
export async function choose(argv: readonly string[], version: string): Promise<Chosen> {
  const { command: named, words, rest } = await lookOver(argv);
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
        if (command.rest !== undefined)
          y.positional(command.rest.name, { type: 'string', array: true, describe: command.rest.describe });
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
        // The parser keeps only the last of several words: they are taken as they were looked over.
        const several = command.rest === undefined ? {} : { [command.rest.name]: rest };
        chosen = () => command.run({ ...(parsed as Readonly<Record<string, unknown>>), ...several });
      },
    );
  }
  let shown = '';
  try {
    await parser.parseAsync([...words], {}, (_error: unknown, _argv: unknown, output: string) => {
      shown = output;
    });
  } catch (error) {
    if (error instanceof UsageError) throw error;
    const message = error instanceof Error ? error.message : String(error);
    throw new UsageError(
      message.replace(/\s*\n\s*/g, '; '),
      named === undefined ? 'polarwright --help' : `polarwright ${named} --help`,
    );
  }
  if (chosen !== undefined) return { kind: 'run', run: chosen };
  return { kind: 'text', text: shown.replaceAll('\u0002', ' ') };
}
