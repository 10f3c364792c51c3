import { fileURLToPath } from 'node:url';
import astro from 'eslint-plugin-astro';
import { createTypeScriptImportResolver } from 'eslint-import-resolver-typescript';
import importX from 'eslint-plugin-import-x';
import jsxA11y from 'eslint-plugin-jsx-a11y';
import reactHooks from 'eslint-plugin-react-hooks';
import tseslint from 'typescript-eslint';

const root = fileURLToPath(new URL('..', import.meta.url));

/** Who may enter which room: every folder outside `allowed` (and the room itself) is closed to `room`. */
const rooms = {
  'src/pages/api': [
    'src/lib/services',
    'src/lib/contracts',
    'src/lib/auth',
    'src/lib/http',
    'src/lib/format',
    'src/lib/time',
    'src/lib/config',
    'ingest',
  ],
  'src/pages': [
    'src/layouts',
    'src/components',
    'src/lib',
    'src/styles',
    'ingest/receive',
    'ingest/quarantine',
    'ingest/imports',
  ],
  'src/layouts': ['src/components', 'src/lib', 'src/styles'],
  'src/components': [
    'src/lib/acoustics',
    'src/lib/contracts',
    'src/lib/format',
    'src/lib/time',
    'src/styles',
  ],
  'src/lib/acoustics': [],
  'src/lib/time': ['src/lib/acoustics'],
  'src/lib/contracts': ['src/lib/acoustics'],
  'src/lib/format': ['src/lib/acoustics', 'src/lib/time'],
  'src/lib/config': ['src/lib/contracts'],
  'src/lib/services': [
    'src/lib/acoustics',
    'src/lib/contracts',
    'src/lib/format',
    'src/lib/time',
    'src/lib/config',
    'db/queries',
  ],
  'src/lib/auth': ['src/lib/services', 'src/lib/contracts', 'src/lib/config', 'src/lib/http', 'db/queries'],
  'src/lib/http': ['src/lib/services', 'src/lib/contracts', 'src/lib/time', 'src/lib/config', 'db/queries'],
  db: ['src/lib/acoustics', 'src/lib/contracts', 'src/lib/config', 'src/lib/time'],
  ingest: [
    'src/lib/acoustics',
    'src/lib/contracts',
    'src/lib/format',
    'src/lib/services',
    'src/lib/time',
    'src/lib/config',
    'db',
  ],
};

const topFolders = [
  'src/pages',
  'src/layouts',
  'src/components',
  'src/styles',
  'src/lib',
  'db',
  'ingest',
  'ops',
];

function zonesOf(room) {
  const allowed = rooms[room];
  const libRooms = Object.keys(rooms).filter((name) => name.startsWith('src/lib/'));
  const candidates = [...topFolders.filter((folder) => folder !== 'src/lib'), ...libRooms];
  return candidates
    .filter((folder) => !folder.startsWith(room) && !room.startsWith(folder))
    .map((folder) => ({
      target: room === 'src/pages' ? ['./src/pages/!(api)/**', './src/pages/*.{astro,ts}'] : `./${room}/**`,
      from: `./${folder}`,
      except: allowed
        .filter((name) => name === folder || name.startsWith(`${folder}/`) || folder.startsWith(`${name}/`))
        .map((name) =>
          name === folder || folder.startsWith(`${name}/`) ? '.' : name.slice(folder.length + 1),
        )
        .map((name) => `./${name}`),
    }))
    .filter((zone) => !zone.except.includes('./.'))
    .map((zone) => ({ ...zone, message: `${room} may import only: ${allowed.join(', ') || 'nothing'}.` }));
}

const testsZone = {
  target: ['./src/**', './db/**', './ingest/**', './ops/**'],
  from: './tests',
  message: 'Nothing imports tests.',
};

export default tseslint.config(
  {
    ignores: [
      'dist/**',
      '.astro/**',
      '.bittern/**',
      'node_modules/**',
      'tests/.output/**',
      'tests/fixtures/**',
    ],
  },
  ...tseslint.configs.recommended,
  ...astro.configs['flat/recommended'],
  ...astro.configs['flat/jsx-a11y-strict'],
  { files: ['**/*.tsx'], rules: jsxA11y.flatConfigs.strict.rules },
  {
    files: ['**/*.{ts,tsx,mjs,astro}'],
    plugins: { 'import-x': importX },
    settings: {
      'import-x/resolver-next': [createTypeScriptImportResolver({ project: `${root}/tsconfig.json` })],
      'import-x/parsers': { '@typescript-eslint/parser': ['.ts', '.tsx'], 'astro-eslint-parser': ['.astro'] },
    },
    rules: {
      'import-x/no-restricted-paths': [
        'error',
        { basePath: root, zones: [...Object.keys(rooms).flatMap(zonesOf), testsZone] },
      ],
      'import-x/no-cycle': ['error', { ignoreExternal: true }],
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/consistent-type-imports': ['error', { fixStyle: 'inline-type-imports' }],
      'no-console': ['error', { allow: ['error'] }],
      eqeqeq: 'error',
    },
  },
  {
    files: ['**/*.tsx'],
    plugins: { 'react-hooks': reactHooks },
    rules: reactHooks.configs.recommended.rules,
  },
  {
    files: ['ops/**', 'db/migrate.ts', 'db/seeds/**', 'ingest/worker.ts', 'ingest/monitor/**', 'tests/**'],
    rules: { 'no-console': 'off' },
  },
  // A declaration file that imports is a module, and Astro's App namespace must be a global.
  { files: ['src/env.d.ts'], rules: { '@typescript-eslint/consistent-type-imports': 'off' } },
);
