import prettier from 'eslint-config-prettier';
import tseslint from 'typescript-eslint';
import angular from 'angular-eslint';
import drizzle from 'eslint-plugin-drizzle';

// A later block replaces an earlier one's options of the same rule, so every block states all that holds for its files.
const restrictImports = (...groups) => [
  'error',
  {
    patterns: [...groups, [['@riseback/*/**'], 'Use the library door.']].map(([group, message]) => ({
      group,
      message,
    })),
  },
];
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
      'no-restricted-imports': restrictImports([
        ['@angular/*', '**/apps/**'],
        'The server does not import the web app.',
      ]),
      'no-restricted-syntax': ['error', noDefault, noEnv, syncTransaction, routerMethods],
      'no-console': 'error',
    },
  },
  {
    files: ['server/src/*/*-service.ts', 'server/src/*/*-routes.ts'],
    rules: {
      'no-restricted-imports': restrictImports(
        [['@angular/*', '**/apps/**'], 'The server does not import the web app.'],
        [['drizzle-orm*', 'better-sqlite3'], 'SQL lives in repositories.'],
      ),
    },
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
      '@angular-eslint/template/prefer-control-flow': 'error',
      '@angular-eslint/template/button-has-type': 'error',
      '@angular-eslint/template/no-negated-async': 'error',
      '@angular-eslint/template/eqeqeq': 'error',
      '@angular-eslint/template/no-duplicate-attributes': 'error',
      '@angular-eslint/template/banana-in-box': 'error',
    },
  },
);
