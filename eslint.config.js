import svelte from 'eslint-plugin-svelte';
import { defineConfig } from 'eslint/config';
import tseslint from 'typescript-eslint';
import svelteConfig from './svelte.config.js';

const NEWER_THAN_ES5 = [
  'VariableDeclaration[kind!="var"]',
  'ArrowFunctionExpression',
  'TemplateLiteral',
  'CatchClause[param=null]',
  'ClassDeclaration',
  ':function[async=true]',
  ':function[generator=true]',
  'SpreadElement',
  'RestElement',
  'ObjectPattern',
  'ArrayPattern',
  'AssignmentPattern',
  'ChainExpression',
  'LogicalExpression[operator="??"]',
  'ForOfStatement',
  'Property[shorthand=true]',
  'Property[method=true]',
  'ImportExpression',
  'ImportDeclaration',
];

export default defineConfig(
  { ignores: ['dist/', 'coverage/', 'node_modules/'] },
  // No comment may switch a rule off: the code changes, or the rule does, here.
  { linterOptions: { noInlineConfig: true } },
  ...tseslint.configs.strict,
  ...svelte.configs.recommended,
  {
    rules: {
      eqeqeq: ['error', 'always'],
      'no-else-return': 'error',
      'no-var': 'error',
      'prefer-const': 'error',
      'object-shorthand': 'error',
      '@typescript-eslint/ban-ts-comment': [
        'error',
        { 'ts-expect-error': 'allow-with-description', minimumDescriptionLength: 10 },
      ],
      '@typescript-eslint/consistent-type-imports': 'error',
      // A map that is built and handed on in one go, or a cache, has no need to be reactive.
      'svelte/prefer-svelte-reactivity': 'off',
      // A lone _ says "not used here", as in `const { id: _, ...rest } = part`.
      '@typescript-eslint/no-unused-vars': ['error', { varsIgnorePattern: '^_$', argsIgnorePattern: '^_' }],
    },
  },
  {
    files: ['**/*.svelte', '**/*.svelte.ts'],
    languageOptions: { parserOptions: { parser: tseslint.parser, extraFileExtensions: ['.svelte'], svelteConfig } },
  },
  {
    // Has to parse on any Node, so that an old one gets a sentence.
    files: ['tests/tools/set-up.cjs'],
    languageOptions: { sourceType: 'commonjs' },
    rules: {
      'no-var': 'off',
      'object-shorthand': 'off',
      'no-restricted-syntax': [
        'error',
        ...NEWER_THAN_ES5.map((selector) => ({ selector, message: 'Too new for an old Node.' })),
      ],
      'prefer-const': 'off',
      'svelte/no-inner-declarations': 'off',
      '@typescript-eslint/no-require-imports': 'off',
    },
  },
);
