/** The import rules of DEVELOPERS.md bite: each room refuses what is above it and takes what is below. */
import { readdirSync, readFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { ESLint } from 'eslint'
import ts from 'typescript'
import { describe, expect, test } from 'vitest'

const eslint = new ESLint({
  // Only the rule under test: the rest of the rules is not for these snippets.
  ruleFilter: ({ ruleId }) =>
    ruleId === 'no-restricted-imports' || ruleId === 'no-restricted-syntax',
})

async function complaints(filePath: string, code: string): Promise<string[]> {
  const [result] = await eslint.lintText(code, { filePath })
  return (result?.messages ?? []).map((message) => message.message)
}

/** Room, file in it, an import it may make, and some that it may not. */
const ROWS: [file: string, allowed: string[], forbidden: string[]][] = [
  [
    'server/engine/tally/x.ts',
    ['zod', '../spec/schema', '@/server/engine/spec/schema'],
    [
      'react',
      'node:fs',
      'date-fns',
      '@/server/contract/paths',
      '../../contract/paths',
      '@/db/client',
    ],
  ],
  [
    'server/contract/x.ts',
    ['zod', '@/server/engine/spec/schema', '../engine/spec/schema'],
    ['@/db/client', '@/server/data/boards', '../data/boards', '@/components/ui/button'],
  ],
  [
    'db/schema/x.ts',
    ['@/server/engine/spec/schema', '@/server/contract/paths', 'drizzle-orm'],
    ['@/server/data/boards', '@/server/auth/viewer', '../../server/data/boards', 'lucia'],
  ],
  [
    'server/auth/x.ts',
    ['lucia', '@/db/client', '@/server/contract/viewer'],
    ['@/server/data/boards', '@/server/http/handler', '../http/handler', '@/hooks/player/types'],
  ],
  [
    'server/data/x.ts',
    ['@/db/client', '@/server/contract/viewer', '@/server/engine/tally/fold'],
    ['lucia', '@/server/auth/viewer', '../auth/viewer', '@/server/actions/sign-in', '@/app/page'],
  ],
  [
    'server/live/x.ts',
    ['@/db/client', '@/server/contract/board'],
    ['@/server/data/boards', '../data/boards', '@/server/http/handler'],
  ],
  [
    'server/mail/x.ts',
    ['@/db/client', '@/server/contract/viewer'],
    ['@/server/data/boards', '@/server/actions/sign-in'],
  ],
  [
    'server/storage/x.ts',
    ['@/db/client', '@/server/contract/viewer'],
    ['@/server/data/boards', '@/server/actions/sign-in'],
  ],
  [
    'server/http/x.ts',
    ['@/server/data/boards', '../auth/viewer', '@/server/live/registry'],
    ['lucia', '@/server/actions/sign-in', '@/components/ui/button', '@/app/page'],
  ],
  [
    'server/actions/x.ts',
    ['@/server/data/boards', '../auth/viewer', '@/server/contract/paths'],
    ['lucia', '@/db/client', '@/components/ui/button', '@/hooks/player/types'],
  ],
  [
    'hooks/player/x.ts',
    ['@/server/engine/timeline/run', '@/server/actions/sign-in', './types', 'zustand'],
    ['@/server/data/boards', '@/db/client', '@/components/ui/button', '../../components/ui/button'],
  ],
  [
    'components/player/x.tsx',
    [
      '@/hooks/player/types',
      '@/components/lane/lane',
      '../figure/figure',
      '@/components/ui/button',
    ],
    ['@/components/board/board', '../board/board', '@/server/data/boards', '@/db/client'],
  ],
  [
    'components/ui/x.tsx',
    ['./button', 'react'],
    [
      '@/components/player/player',
      '../lane/lane',
      '@/server/engine/spec/schema',
      '@/hooks/player/types',
    ],
  ],
  [
    'app/x.tsx',
    ['@/server/data/boards', '@/server/auth/viewer', '@/components/board/board'],
    ['@/db/client', '../db/client', 'lucia'],
  ],
  [
    'scripts/x.ts',
    ['@/db/client', '@/server/data/boards', '@/server/engine/timeline/compile'],
    ['@/server/actions/sign-in', '@/components/ui/button', '@/hooks/player/types', 'lucia'],
  ],
]

describe.each(ROWS)('%s', (file, allowed, forbidden) => {
  test.each(allowed)('may import %s', async (from) => {
    expect(await complaints(file, `import { x } from '${from}'\nx()\n`)).toEqual([])
  })
  test.each(forbidden)('may not import %s', async (from) => {
    expect(await complaints(file, `import { x } from '${from}'\nx()\n`)).not.toEqual([])
  })
})

test('an import of types only is held to the same rules', async () => {
  expect(
    await complaints('server/data/x.ts', "import type { X } from '@/server/auth/viewer'\n"),
  ).toHaveLength(1)
})

test('a re-export is held to the same rules', async () => {
  expect(
    await complaints('server/data/x.ts', "export { x } from '@/server/auth/viewer'\n"),
  ).toHaveLength(1)
})

test('a barrel is refused', async () => {
  expect(await complaints('server/data/x.ts', "export * from './boards'\n")).toHaveLength(1)
})

const FOLDERS = ['app', 'components', 'db', 'hooks', 'scripts', 'server']
const files = FOLDERS.flatMap((folder) =>
  readdirSync(folder, { recursive: true, encoding: 'utf8' })
    .filter((name) => /\.tsx?$/.test(name))
    .map((name) => join(folder, name)),
)
const known = new Set(files)

/** The project's own files that a file imports. */
function importsOf(file: string): string[] {
  return ts
    .preProcessFile(readFileSync(file, 'utf8'))
    .importedFiles.filter(({ fileName }) => /^(?:@\/|\.)/.test(fileName))
    .map(({ fileName }) =>
      fileName.startsWith('@/') ? fileName.slice(2) : join(dirname(file), fileName),
    )
    .flatMap((path) => [path, `${path}.ts`, `${path}.tsx`, `${path}/index.ts`])
    .filter((path) => known.has(path))
}

test('every folder with sources stands in the table', () => {
  const inTable = ROWS.map(([file]) => file.split('/').slice(0, 2).join('/'))
  const rooms = readdirSync('server').map((name) => `server/${name}`)
  expect(rooms.filter((room) => !inTable.includes(room))).toEqual([])
})

test('no file imports itself by way of others', () => {
  const graph = new Map(files.map((file) => [file, importsOf(file)]))
  const done = new Set<string>()
  const cycles: string[] = []
  const walk = (file: string, path: string[]): void => {
    if (path.includes(file)) cycles.push([...path.slice(path.indexOf(file)), file].join(' → '))
    if (done.has(file) || path.includes(file)) return
    for (const next of graph.get(file) ?? []) walk(next, [...path, file])
    done.add(file)
  }
  for (const file of files) walk(file, [])
  expect(cycles).toEqual([])
})

test('what must never reach a browser says so', () => {
  const rooms = /^server\/(auth|data|http|mail|storage|live)\//
  const unmarked = files.filter(
    (file) => rooms.test(file) && !readFileSync(file, 'utf8').includes("import 'server-only'"),
  )
  expect(unmarked).toEqual([])
})
