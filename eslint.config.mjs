import prettier from 'eslint-config-prettier';
import tseslint from 'typescript-eslint';
import angular from 'angular-eslint';
import drizzle from 'eslint-plugin-drizzle';

/** Packages that are not to come in, each with the reason and what to take in its place; docs/security.md says why at all. */
const BANNED_PACKAGES = [
  [['xlsx', 'exceljs'], 'No release on the registry that is still mended: take read-excel-file and write-excel-file.'],
  [
    ['bcrypt', 'argon2'],
    'A second native build to trust and compile: take bcryptjs through platform/auth/passwords.ts.',
  ],
  [['moment', 'moment-timezone'], 'In maintenance only, and its dates change under one: take Date in UTC and Intl.'],
  [
    ['lodash', 'lodash.*', 'lodash-es', 'underscore'],
    'Deep merges pollute prototypes: the language has the rest by now.',
  ],
  [['request', 'node-fetch', 'axios', 'got', 'superagent'], 'Node and browsers have fetch; pages use HttpClient.'],
  [['uuid', 'nanoid', 'shortid'], 'Take crypto.randomUUID().'],
  [['crypto-js', 'md5', 'sha.js', 'tweetnacl'], 'Take node:crypto, or crypto.subtle in the pages.'],
  [['body-parser', 'multer', 'formidable'], 'Bodies are read by platform/http/read-json-body.ts, which bounds them.'],
  [['express-session', 'csurf', 'passport', 'passport-*'], 'Sessions and proofs are those of platform/auth.'],
  [['vm2', 'node-serialize', 'serialize-javascript'], 'Nothing that comes in is ever run: take JSON and a schema.'],
];

// A later block replaces an earlier one's options of the same rule, so every block states all that holds for its files.
const restrictImports = (...groups) => [
  'error',
  {
    patterns: [
      ...[...groups, [['@riseback/*/**'], 'Use the library door.']].map(([group, message]) => ({ group, message })),
      // By regular expression: a gitignore-like group of `uuid` would also refuse our own `./uuid`.
      ...BANNED_PACKAGES.map(([names, message]) => ({ regex: `^(${names.map(wholePackage).join('|')})$`, message })),
    ],
  },
];
function wholePackage(name) {
  return `${name.replaceAll('.', '\\.').replaceAll('*', '[^/]*')}(/.*)?`;
}
const noDefault = { selector: 'ExportDefaultDeclaration', message: 'Named exports only.' };
const noEnv = {
  selector: "MemberExpression[object.name='process'][property.name='env']",
  message: 'Read settings through platform/config.ts.',
};
const syncTransaction = {
  selector: "CallExpression[callee.property.name='transaction'] > :function[async=true]",
  message: 'better-sqlite3 transactions are synchronous.',
};
const noToBeCloseTo = {
  selector: "MemberExpression[property.name='toBeCloseTo']",
  message: 'Absolute digits hide errors in small SI numbers; compare relativeError().',
};
const routerMethods = {
  selector:
    'CallExpression[callee.object.name=/^(app|router)$/][callee.property.name=/^(get|post|put|patch|delete)$/][arguments.length>1]',
  message: 'A route is an entry of the route table, which carries its access rule.',
};

const openPrograms = [
  ['node:child_process', 'child_process', 'node:cluster', 'cluster', 'node:vm', 'vm', 'node:repl', 'node:inspector*'],
  'The server starts no program and runs no text. A place that must is named here, with its reason in docs/security.md.',
];
const rawSql = [
  {
    selector: "MemberExpression[object.name='sql'][property.name='raw']",
    message: 'A text put into SQL as it stands: bind it with sql`${value}`.',
  },
  {
    selector: 'CallExpression[callee.property.name=/^(prepare|exec)$/] > TemplateLiteral[expressions.length>0]',
    message: 'SQL is not put together from pieces: bind values with ?.',
  },
];
/** Where SQL is made of names of our own tables and columns, which cannot be bound. No request's text reaches them. */
const RAW_SQL_PLACES = [
  'server/src/platform/db/schema.ts',
  'server/src/platform/db/content-hash.ts',
  'server/src/platform/backup/sealed-copy.ts',
  'server/src/platform/backup/restore.ts',
  'server/src/networks/element-repository.ts',
];
const noMarkup = {
  selector:
    'MemberExpression[property.name=/^(innerHTML|outerHTML|insertAdjacentHTML|srcdoc|createContextualFragment|bypassSecurityTrust\\w*)$/]',
  message: 'Text is shown as text: bind it, or set textContent. Markup from data is how scripts get in.',
};
const noDocumentWrite = {
  selector: "MemberExpression[object.name='document'][property.name=/^(write|writeln)$/]",
  message: 'Text is shown as text: bind it in a template.',
};
const noMarkupBinding = {
  selector: 'BoundAttribute[name=/^(innerHTML|outerHTML|srcdoc)$/]',
  message: 'Text is shown as text: {{ }} or [textContent]. Markup from data is how scripts get in.',
};
const weakHash = {
  selector: 'CallExpression[callee.name=/^create(Hash|Hmac)$/]:not([arguments.0.value=/^sha(256|384|512)$/])',
  message: 'SHA-256 or longer, named as a literal.',
};
const builtExpression = {
  selector: ':matches(NewExpression, CallExpression)[callee.name="RegExp"]:not([arguments.0.type="Literal"])',
  message: 'No regular expression is made of a text that comes in: compare texts.',
};
/** Values that someone could guess, and places that someone could send the server to. */
const noGuessNorCall = {
  'no-restricted-globals': [
    'error',
    { name: 'fetch', message: 'The server asks nobody for anything (docs/security.md).' },
  ],
  'no-restricted-properties': [
    'error',
    { object: 'Math', property: 'random', message: 'Predictable: randomUUID() or randomBytes() of node:crypto.' },
  ],
};

const outer = ['@angular/*', 'express', 'drizzle-orm*', 'better-sqlite3', 'rxjs*', 'node:*'];
/** Which libraries each may import; only network and contracts may use zod. */
const arrows = {
  numerics: [],
  units: [],
  steam: ['numerics'],
  hydraulics: ['steam', 'numerics'],
  network: [],
  solver: ['network', 'hydraulics', 'steam', 'numerics'],
  contracts: ['network'],
  diagnosis: ['solver', 'network', 'hydraulics', 'steam', 'numerics'],
  revisions: ['contracts', 'network'],
  figures: ['contracts', 'network', 'solver', 'units'],
  methods: ['contracts', 'network', 'hydraulics', 'steam'],
};
const libraries = Object.entries(arrows).map(([name, may]) => ({
  files: [`libs/${name}/**/*.ts`],
  ignores: ['**/*.spec.ts'],
  rules: {
    'no-console': 'error',
    'no-restricted-imports': restrictImports(
      [[...outer, ...(['network', 'contracts'].includes(name) ? [] : ['zod'])], 'Libraries are pure TypeScript.'],
      [
        ['@riseback/*', ...may.map((library) => `!@riseback/${library}`)],
        `${name} may import ${may.join(', ') || 'no other library'}.`,
      ],
    ),
  },
}));

export default tseslint.config(
  { ignores: ['node_modules', 'dist', 'out', 'data', 'screens', '.angular', '**/*.mjs', '**/*.config.ts'] },
  {
    files: ['**/*.ts'],
    extends: [tseslint.configs.base, prettier],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    rules: {
      'no-restricted-syntax': ['error', noDefault],
      'no-restricted-imports': restrictImports(),
      'no-eval': 'error',
      'no-new-func': 'error',
      'no-script-url': 'error',
      '@typescript-eslint/no-implied-eval': 'error',
      eqeqeq: ['error', 'smart'],
      '@typescript-eslint/no-unused-vars': ['error', { ignoreRestSiblings: true }],
      '@typescript-eslint/no-floating-promises': 'error',
      '@typescript-eslint/no-misused-promises': 'error',
      '@typescript-eslint/await-thenable': 'error',
      '@typescript-eslint/only-throw-error': 'error',
      '@typescript-eslint/switch-exhaustiveness-check': ['error', { considerDefaultExhaustiveForUnions: true }],
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-unsafe-argument': 'error',
      '@typescript-eslint/no-unsafe-assignment': 'error',
      '@typescript-eslint/no-unsafe-member-access': 'error',
      '@typescript-eslint/no-unsafe-return': 'error',
      '@typescript-eslint/no-non-null-assertion': 'error',
      '@typescript-eslint/consistent-type-imports': 'error',
      '@typescript-eslint/no-deprecated': 'error',
      '@typescript-eslint/restrict-plus-operands': 'error',
      '@typescript-eslint/no-unnecessary-condition': 'error',
    },
  },
  ...libraries,
  { files: ['libs/**/*.spec.ts'], rules: { 'no-restricted-syntax': ['error', noDefault, noToBeCloseTo] } },
  {
    files: ['apps/**/*.ts'],
    rules: {
      'no-restricted-imports': restrictImports([
        ['**/server/**', 'express', 'drizzle-orm*', 'better-sqlite3', 'node:*'],
        'The browser cannot import the server.',
      ]),
    },
  },
  {
    files: ['apps/**/*.ts'],
    ignores: ['apps/web/src/app/drawing/graph-canvas/**'],
    rules: {
      'no-restricted-imports': restrictImports(
        [
          ['**/server/**', 'express', 'drizzle-orm*', 'better-sqlite3', 'node:*'],
          'The browser cannot import the server.',
        ],
        [['@swimlane/ngx-graph'], 'Only the graph canvas knows the graph library.'],
      ),
    },
  },
  {
    files: ['server/**/*.ts'],
    plugins: { drizzle },
    rules: {
      'drizzle/enforce-delete-with-where': ['error', { drizzleObjectName: ['db', 'tx'] }],
      'drizzle/enforce-update-with-where': ['error', { drizzleObjectName: ['db', 'tx'] }],
      'no-restricted-imports': restrictImports(
        [['@angular/*', '**/apps/**'], 'The server does not import the web app.'],
        openPrograms,
      ),
      'no-restricted-syntax': [
        'error',
        noDefault,
        noEnv,
        syncTransaction,
        routerMethods,
        weakHash,
        builtExpression,
        ...rawSql,
      ],
      'no-console': 'error',
      ...noGuessNorCall,
    },
  },
  {
    files: RAW_SQL_PLACES,
    rules: {
      'no-restricted-syntax': ['error', noDefault, noEnv, syncTransaction, routerMethods, weakHash, builtExpression],
    },
  },
  {
    files: ['server/src/*/*-service.ts', 'server/src/*/*-routes.ts'],
    rules: {
      'no-restricted-imports': restrictImports(
        [['@angular/*', '**/apps/**'], 'The server does not import the web app.'],
        [['drizzle-orm*', 'better-sqlite3'], 'SQL lives in repositories.'],
        openPrograms,
      ),
    },
  },
  {
    files: ['apps/**/*.ts'],
    ignores: ['**/*.spec.ts'],
    rules: { 'no-restricted-syntax': ['error', noDefault, noMarkup, noDocumentWrite] },
  },
  {
    files: ['apps/**/*.ts'],
    ignores: ['**/*.spec.ts'],
    plugins: { '@angular-eslint': angular.tsPlugin },
    processor: angular.processInlineTemplates,
    rules: {
      '@angular-eslint/prefer-on-push-component-change-detection': 'error',
      '@angular-eslint/prefer-inject': 'error',
      '@angular-eslint/prefer-signals': 'error',
      '@angular-eslint/prefer-host-metadata-property': 'error',
      '@angular-eslint/prefer-output-emitter-ref': 'error',
      '@angular-eslint/no-uncalled-signals': 'error',
      '@angular-eslint/computed-must-return': 'error',
      '@angular-eslint/no-async-lifecycle-method': 'error',
      '@angular-eslint/no-output-native': 'error',
      '@angular-eslint/no-experimental': 'error',
      '@angular-eslint/use-lifecycle-interface': 'error',
    },
  },
  {
    files: ['apps/**/*.html'],
    extends: [...angular.configs.templateAccessibility],
    languageOptions: { parser: angular.templateParser },
    plugins: { '@angular-eslint/template': angular.templatePlugin },
    rules: {
      'no-restricted-syntax': ['error', noMarkupBinding],
      '@angular-eslint/template/prefer-control-flow': 'error',
      '@angular-eslint/template/button-has-type': 'error',
      '@angular-eslint/template/no-negated-async': 'error',
      '@angular-eslint/template/eqeqeq': 'error',
      '@angular-eslint/template/no-duplicate-attributes': 'error',
      '@angular-eslint/template/banana-in-box': 'error',
    },
  },
);
