// Style is prettier's; this file holds what it cannot see: wrong code, and the direction of imports.
import astro from 'eslint-plugin-astro';
import tseslint from 'typescript-eslint';

/** One layer's rule: which other areas it may not import, and where the thing belongs instead. */
const layer = (folder, forbidden, message, more = []) => ({
  files: [`src/${folder}/**/*.{ts,tsx,astro}`],
  rules: {
    'no-restricted-imports': [
      'error',
      {
        patterns: [
          { regex: `^(@/|(\\.\\./)+(src/)?)(${forbidden.join('|')})(/|$)`, message },
          ...more,
        ],
      },
    ],
  },
});

const sdks = {
  regex:
    '^(drizzle-orm|mysql2|lucia|@lucia-auth|@aws-sdk|nodemailer|sharp|@node-rs/argon2|otpauth|rate-limiter-flexible)(/|$)',
  message:
    'Only src/server (and src/db for Drizzle) talks to services: put this behind a port there.',
};

export default [
  { ignores: ['node_modules/', 'dist/', '.astro/', '.data/', 'tests/.output/'] },
  ...tseslint.configs.recommended,
  ...astro.configs.recommended,
  {
    rules: {
      '@typescript-eslint/no-unused-vars': [
        'error',
        { argsIgnorePattern: '^_', varsIgnorePattern: '^_' },
      ],
      'no-console': ['error', { allow: ['error'] }],
      eqeqeq: ['error', 'always', { null: 'ignore' }],
    },
  },
  { files: ['src/cli/**', 'fakes/**', 'tests/**'], rules: { 'no-console': 'off' } },
  {
    files: ['src/domain/**/*.ts'],
    rules: {
      'no-restricted-imports': [
        'error',
        {
          patterns: [
            {
              regex:
                '^(@/(?!domain/)|[a-z@](?!/)|(\\.\\./)+(server|db|pages|islands|contracts|components|layouts|cli)/)',
              message:
                'The domain is pure: it imports only src/domain. Pass the thing in as an argument.',
            },
          ],
        },
      ],
      'no-restricted-globals': ['error', 'process', 'fetch', 'window', 'document', 'setTimeout'],
      'no-restricted-properties': [
        'error',
        { object: 'Math', property: 'random', message: 'Take a seeded source as an argument.' },
        { object: 'Date', property: 'now', message: 'Take `now` as an argument.' },
      ],
    },
  },
  layer(
    'contracts',
    ['server', 'db', 'pages', 'islands', 'components', 'layouts'],
    'Contracts import domain and zod only.',
    [sdks],
  ),
  layer(
    'db',
    ['server', 'pages', 'islands', 'components', 'layouts'],
    'The database layer knows tables only: rules belong in src/server.',
  ),
  layer(
    'server',
    ['pages', 'islands', 'components', 'layouts'],
    'The server does not know its screens.',
  ),
  layer(
    'islands',
    ['server', 'db', 'pages', 'layouts'],
    'An island runs in the browser: fetch through src/contracts.',
    [sdks],
  ),
  layer('components', ['server', 'db', 'pages'], 'Components are given their data by the page.', [
    sdks,
  ]),
  layer('layouts', ['db', 'pages'], 'Layouts are given their data by the page.', [sdks]),
  layer('pages', ['db'], 'Pages are thin: queries and commands live in src/server.', [sdks]),
  {
    files: ['src/server/**/*.ts'],
    ignores: ['src/server/auth/**'],
    rules: {
      'no-restricted-imports': [
        'error',
        {
          patterns: [
            {
              regex: '^(@/|(\\.\\./)+)(pages|islands|components|layouts)(/|$)',
              message: 'The server does not know its screens.',
            },
            { regex: '^(lucia|@lucia-auth)(/|$)', message: 'Sessions are behind src/server/auth.' },
          ],
        },
      ],
    },
  },
];
