import { readdirSync } from 'node:fs'
import nextVitals from 'eslint-config-next/core-web-vitals'
import nextTypescript from 'eslint-config-next/typescript'

/** The rooms of the project and what each may import. DEVELOPERS.md has the same table in words. */
const PURE = ['server/engine', 'server/contract']
export const ROOMS = {
  'server/engine': ['server/engine'],
  'server/contract': PURE,
  db: ['db', ...PURE],
  'server/auth': ['server/auth', 'db', ...PURE],
  'server/data': ['server/data', 'db', ...PURE],
  'server/mail': ['server/mail', 'db', ...PURE],
  'server/storage': ['server/storage', 'db', ...PURE],
  'server/live': ['server/live', 'db', ...PURE],
  'server/http': [
    'server/http',
    'server/data',
    'server/auth',
    'server/mail',
    'server/storage',
    'server/live',
    'db/client',
    ...PURE,
  ],
  'server/actions': [
    'server/actions',
    'server/http/log',
    'server/data',
    'server/auth',
    'server/mail',
    'server/storage',
    'server/live',
    ...PURE,
  ],
  hooks: ['hooks', 'server/actions', ...PURE],
  components: ['components', 'hooks', 'server/actions', ...PURE],
  app: ['app', 'components', 'hooks', 'server'],
  scripts: ['scripts', 'db', 'server/data', ...PURE],
}
const TOP = ['app', 'components', 'db', 'hooks', 'scripts', 'tests', 'server']
/** Features that every other one may draw with: a feature imports no other but these. */
const SHARED_FEATURES = ['figure', 'lane', 'ui']
export const FEATURES = readdirSync(new URL('components', import.meta.url))

const escaped = (text) => text.replaceAll('/', '\\/')
/** Any import by alias, or climbing out of the folder, of something that is not among `allowed`. */
const onlyFrom = (allowed, message) => ({
  regex: `^(?:@\\/|(?:\\.\\.\\/)+)(?=(?:${TOP.join('|')}|engine|contract|auth|data|http|live|mail|storage|actions)(?:\\/|$))(?!(?:${allowed
    .flatMap((room) => [
      escaped(room),
      ...(room.startsWith('server/') ? [escaped(room.slice('server/'.length))] : []),
    ])
    .join('|')})(?:\\/|$))`,
  message,
})

const rooms = Object.entries(ROOMS).map(([room, allowed]) => ({
  files: [`${room}/**/*.{ts,tsx}`],
  rules: {
    'no-restricted-imports': [
      'error',
      {
        patterns: [
          onlyFrom(allowed, `${room}/ may import from: ${allowed.join(', ')} (DEVELOPERS.md).`),
          ...(room === 'server/engine'
            ? [
                {
                  regex: '^(?!\\.|@\\/|zod$)',
                  message: 'The engine imports zod and nothing else from outside.',
                },
              ]
            : []),
          ...(room === 'server/auth'
            ? []
            : [{ regex: '^lucia$|^@lucia-auth\\/', message: 'Only server/auth knows lucia.' }]),
        ],
      },
    ],
  },
}))

const features = FEATURES.map((feature) => ({
  files: [`components/${feature}/**/*.{ts,tsx}`],
  rules: {
    'no-restricted-imports': [
      'error',
      {
        patterns: [
          feature === 'ui'
            ? onlyFrom(['components/ui'], 'components/ui knows no word of the product.')
            : onlyFrom(
                ROOMS.components,
                `components/ may import from: ${ROOMS.components.join(', ')} (DEVELOPERS.md).`,
              ),
          {
            regex: `^(?:@\\/components\\/|\\.\\.\\/)(?!(?:${(feature === 'ui' ? ['ui'] : [feature, ...SHARED_FEATURES]).join('|')})\\/)(?:${FEATURES.join('|')})\\/`,
            message: 'A feature imports no other feature but figure/, lane/ and ui/.',
          },
          { regex: '^lucia$|^@lucia-auth\\/', message: 'Only server/auth knows lucia.' },
        ],
      },
    ],
  },
}))

const config = [
  {
    ignores: [
      '.next/**',
      '.next-dev/**',
      '.next-test/**',
      '.floorside/**',
      '.shots/**',
      'public/**',
      'next-env.d.ts',
      'test-results/**',
      'playwright-report/**',
    ],
  },
  ...nextVitals,
  ...nextTypescript,
  {
    files: ['**/*.{ts,tsx}'],
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-non-null-assertion': 'error',
      '@typescript-eslint/consistent-type-imports': 'error',
      '@typescript-eslint/no-unused-vars': [
        'error',
        { argsIgnorePattern: '^_', varsIgnorePattern: '^_' },
      ],
      'no-restricted-syntax': [
        'error',
        {
          selector: 'ExportAllDeclaration',
          message: 'No barrels: import from the file that has it.',
        },
      ],
      // The store fixes what a page was opened with; see hooks/player/use-browser-player.ts.
      'react-hooks/set-state-in-effect': 'off',
    },
  },
  ...rooms,
  ...features,
]

export default config
