// @ts-check
/**
 * The arrows of the architecture as ESLint rules. Flat config replaces a rule wholesale, so each layer's block names
 * everything that the layer must not do; `test/lint/arrows.spec.ts` proves that they bite.
 */

/** @typedef {{ regex: string, message: string }} Ban */
/** @typedef {{ selector: string, message: string }} Syntax */

/** @type {(regex: string, message: string) => Ban} */
const ban = (regex, message) => ({ regex, message });

const NO_API = ban('(^|/)(api)/', 'src and api never meet: what both need is in shared.');
const NO_SRC = ban('(^|/)src/', 'src and api never meet: what both need is in shared.');
const NO_SERVER = ban('^(node:|express$|typeorm$|better-sqlite3$|pino)', 'That belongs to the server.');
const NO_CLIENT = ban('^(@angular/|idb-keyval$|chart\\.js|ng2-charts)', 'That belongs to the application.');
const SHARED_BY_ALIAS = ban('^\\.\\./.*shared/', 'Import shared by @shared/…');
const ZOD_MINI = ban('^zod$', "import * as z from 'zod/mini': the whole of zod costs Loomside 17 kB more.");
const NO_IDB = ban('^idb-keyval$', 'src/app/offline is the only door to IndexedDB.');
const NO_CHARTS = ban('^(chart\\.js|ng2-charts)', 'Charts are drawn by src/app/ui/chart, loaded lazily.');
const NO_STATISTICS = ban('^(jstat|@stdlib/)', 'Statistics are behind shared/chance.');
const NO_CHANCE = ban(
  '(^|/)(chance|ahead)/',
  'The statistics packages would come along to Loomside: take what is needed as a parameter.',
);
/**
 * For code that is loaded at once; types cost nothing, and `import()` is how the statistics are fetched.
 * @type {Ban & { allowTypeImports: true }}
 */
const CHANCE_LAZILY = {
  ...ban('(^|/)(chance|ahead)/', 'Statistics are heavy: fetch them by import() where they are shown.'),
  allowTypeImports: true,
};
const NO_TESTING = ban('(^|/)testing/', 'Builders for specs are for specs.');

/** @type {(layers: string[], message: string) => Ban} */
const above = (layers, message) => ban(`^(\\.{1,2}/)+(app/)?(${layers.join('|')})(/|$)`, message);

const CLIENT = [NO_API, NO_SERVER, SHARED_BY_ALIAS, ZOD_MINI, NO_STATISTICS];
const ARROW = 'The arrow is shell → features → offline → core; all may use ui, ui nothing but shared.';

const SHARED = [
  ban('^(?!\\.{1,2}/|zod/mini$)', 'shared imports nothing outside itself but zod/mini.'),
  ban('^(\\.\\./){2}', 'shared imports nothing outside itself.'),
  NO_API,
  NO_SRC,
];

/** What each layer must not import. @type {Record<string, Ban[]>} */
const BANS = {
  src: [...CLIENT, NO_IDB, NO_CHARTS],
  'src/app/shell': [...CLIENT, NO_IDB, NO_CHARTS],
  'src/app/features': [...CLIENT, NO_IDB, NO_CHARTS, above(['shell'], ARROW)],
  'src/app/offline': [...CLIENT, NO_CHARTS, above(['shell', 'features'], ARROW)],
  'src/app/core': [...CLIENT, NO_IDB, NO_CHARTS, above(['shell', 'features', 'offline'], ARROW)],
  'src/app/ui': [...CLIENT, NO_IDB, NO_CHARTS, above(['shell', 'features', 'offline', 'core'], ARROW)],
  'src/app/ui/chart': [...CLIENT, NO_IDB, above(['shell', 'features', 'offline', 'core'], ARROW)],
  shared: SHARED,
  'shared/at-once': [...SHARED, NO_CHANCE],
  'shared/chance': [
    ban('^(?!\\.{1,2}/|jstat$|@stdlib/)', 'chance imports nothing outside shared but jstat and @stdlib.'),
    ban('^(\\.\\./){2}', 'shared imports nothing outside itself.'),
    NO_API,
    NO_SRC,
  ],
  api: [NO_SRC, NO_CLIENT, ZOD_MINI],
  'api/database': [NO_SRC, NO_CLIENT, ZOD_MINI, ban('/features/', 'routes → service → database.')],
  'api/routes': [
    NO_SRC,
    NO_CLIENT,
    ZOD_MINI,
    ban('/database/(entities|migrations)', 'Entities stay behind services and mappers.'),
    ban('^typeorm$', 'routes → service → database.'),
  ],
};

/**
 * A regular expression inside an esquery selector, which cannot hold a slash.
 * @type {(regex: string) => string}
 */
const inSelector = (regex) => `/${regex.replaceAll('/', '\\u002F')}/`;

/**
 * The same bans for `import('…')` and for `import('…')` as a type, which the import rule does not see.
 * @type {(bans: Ban[]) => Syntax[]}
 */
const dynamic = (bans) =>
  bans.flatMap(({ regex, message }) => [
    { selector: `ImportExpression[source.value=${inSelector(regex)}]`, message },
    { selector: `TSImportType[source.value=${inSelector(regex)}]`, message },
  ]);

/**
 * The blocks of one layer: its application files, and its specs (which may use builders).
 * @param {string} name
 * @param {string[]} files
 * @param {{ depth?: number, syntax?: Syntax[] }} [options] depth: folders below the feature's siblings
 * @returns {import('eslint').Linter.Config[]}
 */
export function layer(name, files, { depth = 0, syntax = [] } = {}) {
  const bans = [...(BANS[name] ?? [])];
  if (depth) bans.push(ban(`^(\\.\\./){${depth}}(?!\\.\\./)[^.]`, 'A feature never imports a sibling.'));
  const rules = (/** @type {Ban[]} */ list) => ({
    '@typescript-eslint/no-restricted-imports': /** @type {const} */ ([
      'error',
      { patterns: name.startsWith('src') ? [...list, CHANCE_LAZILY] : list },
    ]),
    'no-restricted-syntax': /** @type {const} */ (['error', ...dynamic(list), ...syntax]),
  });
  const application = name.startsWith('src') ? [...bans, NO_TESTING] : bans;
  const inSpecs = bans.filter((one) => !one.regex.startsWith('^(?!') && one !== NO_CHANCE);
  return [
    { files, ignores: ['**/*.spec.ts', '**/testing/**'], rules: rules(application) },
    {
      files: files.map((pattern) => pattern.replace(/\.ts$/, '.spec.ts')),
      rules: { '@typescript-eslint/no-restricted-imports': ['error', { patterns: inSpecs }] },
    },
  ];
}

/** shared/ has no clock, no chance, no I/O. @type {Syntax[]} */
export const PURE = [
  {
    selector: "MemberExpression[object.name='Date'][property.name='now']",
    message: 'shared has no clock: take the moment as a parameter.',
  },
  {
    selector: "NewExpression[callee.name='Date'][arguments.length=0]",
    message: 'shared has no clock: take the moment as a parameter.',
  },
  { selector: "CallExpression[callee.name='Date']", message: 'shared has no clock.' },
  {
    selector: "MemberExpression[object.name='Math'][property.name='random']",
    message: 'shared has no chance: take a seeded generator as a parameter.',
  },
];

const WRITER = 'Writes go through deps.writer.write(async (tx) => …): call them on `tx`.';
const SQL_WRITE = '/^\\s*(insert|update|delete|replace)\\b/i';

/**
 * The writer hands its entity manager to its callback as `tx`, and helpers take it by that name: what writes is called
 * on `tx`, or on a repository or query builder made from it. @type {Syntax[]}
 */
export const WRITES = [
  {
    selector:
      "CallExpression[callee.property.name=/^(save|insert|upsert|softRemove|softDelete|increment|decrement)$/]:not([callee.object.name='tx']):not([callee.object.callee.object.name='tx']):not([callee.object.property.name='store'])",
    message: WRITER,
  },
  {
    selector:
      "CallExpression[callee.property.name=/^(update|delete|remove|clear)$/][callee.object.callee.property.name=/^(getRepository|createQueryBuilder)$/]:not([callee.object.callee.object.name='tx'])",
    message: WRITER,
  },
  {
    selector:
      "CallExpression[callee.property.name=/^(getRepository|createQueryBuilder|createQueryRunner|transaction)$/]:not([callee.object.name='tx']):not([callee.object.property.name='reads']):not([callee.object.name='reads'])",
    message: 'A repository is made from `tx` (to write) or from `reads` (to read), nowhere else.',
  },
  ...['query', 'run', 'exec'].flatMap((method) => [
    {
      selector: `CallExpression[callee.property.name='${method}']:not([callee.object.name='tx']) > Literal.arguments[value=${SQL_WRITE}]`,
      message: WRITER,
    },
    {
      selector: `CallExpression[callee.property.name='${method}']:not([callee.object.name='tx']) > TemplateLiteral.arguments > TemplateElement:first-child[value.raw=${SQL_WRITE}]`,
      message: WRITER,
    },
  ]),
];

/** A spec that is left out, or that leaves out all others, is a promise nobody keeps. @type {Syntax[]} */
export const NO_LEFT_OUT_TESTS = [
  {
    selector:
      'MemberExpression[property.name=/^(only|skip|skipIf|runIf|todo|fixme)$/]:matches([object.name=/^(it|test|describe|suite|bench)$/], [object.property.name=/^(describe|each|concurrent|sequential|serial|parallel)$/])',
    message: 'No spec is left out and none runs alone.',
  },
  {
    selector: 'CallExpression[callee.name=/^(fit|fdescribe|xit|xdescribe|xtest)$/]',
    message: 'No spec is left out and none runs alone.',
  },
];
