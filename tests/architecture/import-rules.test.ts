import { spawnSync } from 'node:child_process'
import { cpSync, mkdirSync, mkdtempSync, rmSync, symlinkSync, writeFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { projectFolder } from '../../scripts/steps/project-folder.mjs'

/** One violation of each rule: the file that breaks it, and what else has to exist. */
const planted: [rule: string, file: string, content: string, besides?: Record<string, string>][] = [
  ['diagrams', 'diagrams/solver/a.ts', `import 'kysely'`],
  ['diagrams', 'diagrams/solver/a.ts', `import '@/lib/shared/b'`, { 'lib/shared/b.ts': '' }],
  ['diagrams-no-node', 'diagrams/solver/a.ts', `import 'node:fs'`],
  ['diagrams-tables', 'diagrams/tables/a.ts', `import '../document/b'`, { 'diagrams/document/b.ts': '' }],
  ['diagrams-document', 'diagrams/document/a.ts', `import '../solver/b'`, { 'diagrams/solver/b.ts': '' }],
  ['diagrams-commands', 'diagrams/commands/a.ts', `import '../solver/b'`, { 'diagrams/solver/b.ts': '' }],
  ['diagrams-solver', 'diagrams/solver/a.ts', `import '../faults/b'`, { 'diagrams/faults/b.ts': '' }],
  ['diagrams-faults', 'diagrams/faults/a.ts', `import '../planner/b'`, { 'diagrams/planner/b.ts': '' }],
  ['diagrams-planner', 'diagrams/planner/a.ts', `import '../drawing/b'`, { 'diagrams/drawing/b.ts': '' }],
  ['diagrams-distance', 'diagrams/distance/a.ts', `import '../faults/b'`, { 'diagrams/faults/b.ts': '' }],
  [
    'diagrams-fault-table',
    'diagrams/fault-table/a.ts',
    `import '../faults/b'`,
    { 'diagrams/faults/b.ts': '' },
  ],
  ['diagrams-drawing', 'diagrams/drawing/a.ts', `import '../faults/b'`, { 'diagrams/faults/b.ts': '' }],
  ['diagrams-samples', 'diagrams/samples/a.ts', `import '../drawing/b'`, { 'diagrams/drawing/b.ts': '' }],
  ['diagrams-layers-only', 'lib/shared/a.ts', `import '@/diagrams/odd/b'`, { 'diagrams/odd/b.ts': '' }],
  ['db', 'db/a.ts', `import '@/lib/shared/b'`, { 'lib/shared/b.ts': '' }],
  ['db', 'db/a.ts', `import 'zod'`],
  ['migrations', 'migrations/a.ts', `import '../db/b'`, { 'db/b.ts': '' }],
  ['migrations', 'migrations/a.ts', `import 'pg'`],
  ['migrations-no-node', 'migrations/a.ts', `import 'node:fs'`],
  ['lib-shared', 'lib/shared/a.ts', `import '../client/b'`, { 'lib/client/b.ts': '' }],
  ['lib-shared', 'lib/shared/a.ts', `import 'react'`],
  ['lib-shared-no-node', 'lib/shared/a.ts', `import 'node:fs'`],
  ['lib-client', 'lib/client/a.ts', `import '@/components/b'`, { 'components/b.ts': '' }],
  ['lib-client', 'lib/client/a.ts', `import '../server/b'`, { 'lib/server/b.ts': '' }],
  ['lib-client-no-node', 'lib/client/a.ts', `import 'node:fs'`],
  ['lib-client-no-next-server', 'lib/client/a.ts', `import 'next/headers'`],
  ['lib-server', 'lib/server/a.ts', `import '@/components/b'`, { 'components/b.ts': '' }],
  ['lib-server', 'lib/server/a.ts', `import '../client/b'`, { 'lib/client/b.ts': '' }],
  ['next-in-http-only', 'lib/server/use-cases/a.ts', `import 'next/headers'`],
  ['next-in-http-only', 'lib/server/use-cases/a.ts', `import 'next-auth'`],
  ['components', 'components/a.ts', `import '@/lib/server/b'`, { 'lib/server/b.ts': '' }],
  ['components', 'components/a.ts', `import '@/db/b'`, { 'db/b.ts': '' }],
  ['components-no-node', 'components/a.ts', `import 'node:fs'`],
  ['react-flow-in-canvas-only', 'components/trace/a.ts', `import 'reactflow'`],
  ['react-flow-in-canvas-only', 'app/a.ts', `import 'reactflow'`],
  ['app', 'app/a.ts', `import '@/db/b'`, { 'db/b.ts': '' }],
  ['app', 'app/a.ts', `import type { B } from '@/db/b'`, { 'db/b.ts': 'export type B = string' }],
  ['app', 'proxy.ts', `import '@/db/b'`, { 'db/b.ts': '' }],
  ['app-no-node', 'app/a.ts', `import 'node:fs'`],
  ['sql-in-db-only', 'lib/server/a.ts', `import 'kysely'`],
  ['sql-in-db-only', 'app/a.ts', `import 'pg'`],
  ['nobody-imports-tests', 'lib/server/a.ts', `import '@/tests/b'`, { 'tests/b.ts': '' }],
  ['nobody-imports-tests', 'lib/server/a.ts', `import '@/scripts/b'`, { 'scripts/b.ts': '' }],
  ['scripts-import-no-tests', 'scripts/a.ts', `import '../tests/b'`, { 'tests/b.ts': '' }],
  ['no-cycles', 'db/a.ts', `import './b'`, { 'db/b.ts': `import './a'` }],
  [
    'no-cycles',
    'db/a.ts',
    `import type { B } from './b'\nexport type A = B`,
    { 'db/b.ts': `import type { A } from './a'\nexport type B = A` },
  ],
  ['resolvable', 'db/a.ts', `import './nowhere'`],
  ['use-client-in-components-only', 'app/a.tsx', `'use client'`],
  ['use-client-in-components-only', 'lib/client/a.ts', `// Why.\n"use client"`],
]

/** Every row gets file names of its own, so that one run over one tree shows all of them. */
const numbered = planted.map(([rule, file, content, besides = {}], index) => {
  const own = (text: string) => text.replace(/\b([ab])(?=\.tsx?$|')/, `$1${index}`)
  const fileOf = (name: string) => (name === 'proxy.ts' ? name : own(name))
  const others = Object.entries(besides).map(([name, text]) => [fileOf(name), own(text)])
  return { rule, file: fileOf(file), files: { [fileOf(file)]: own(content), ...Object.fromEntries(others) } }
})

let tree: string

beforeEach(() => {
  tree = mkdtempSync(path.join(tmpdir(), 'imports-'))
  symlinkSync(path.join(projectFolder, 'node_modules'), path.join(tree, 'node_modules'))
  cpSync(path.join(projectFolder, 'tsconfig.json'), path.join(tree, 'tsconfig.json'))
})

afterEach(() => rmSync(tree, { recursive: true, force: true }))

function plant(files: Record<string, string>): void {
  for (const [file, content] of Object.entries(files)) {
    mkdirSync(path.dirname(path.join(tree, file)), { recursive: true })
    writeFileSync(path.join(tree, file), `${content}\n`)
  }
}

function check(): { code: number | null; reported: string[] } {
  const script = path.join(projectFolder, 'scripts', 'check-imports.mjs')
  const { status, stderr } = spawnSync(process.execPath, [script, tree], { encoding: 'utf8' })
  return { code: status, reported: stderr.trim().split('\n') }
}

describe('the import rules', () => {
  it('report a planted violation of every rule', () => {
    for (const { files } of numbered) plant(files)
    const { code, reported } = check()
    expect(code).toBe(1)
    const missed = numbered.filter(
      ({ rule, file }) => !reported.some((line) => line.startsWith(`${rule}: ${file}`)),
    )
    expect(missed).toEqual([])
  })

  it('have a planted violation each', () => {
    const { forbidden } = createRequire(import.meta.url)('../../.dependency-cruiser.cjs') as {
      forbidden: { name: string }[]
    }
    const named = new Set(planted.map(([rule]) => rule))
    expect(forbidden.map((rule) => rule.name).filter((name) => !named.has(name))).toEqual([])
  })

  it('hold in a tree that imports downwards only', () => {
    plant({
      'diagrams/tables/a.ts': 'export const a = 1',
      'diagrams/document/b.ts': `import { z } from 'zod'\nimport { a } from '../tables/a'\nexport const b = z.literal(a)`,
      'diagrams/planner/c.ts': `import { b } from '@/diagrams/document/b'\nexport const c = b`,
      'db/d.ts': `import { randomUUID } from 'node:crypto'\nimport { Kysely } from 'kysely'\nimport pg from 'pg'\nexport const d = [randomUUID, Kysely, pg]`,
      'lib/server/http/e.ts': `import { headers } from 'next/headers'\nimport { d } from '@/db/d'\nexport const e = [headers, d]`,
      'components/canvas/f.tsx': `'use client'\nimport { ReactFlow } from 'reactflow'\nexport const F = ReactFlow`,
      'app/page.tsx': `import { F } from '@/components/canvas/f'\nimport { e } from '@/lib/server/http/e'\nexport default function Page() { return <F id={String(e)} /> }`,
    })
    expect(check()).toEqual({ code: 0, reported: [''] })
  })

  it('fail in a tree where nothing can be read', () => {
    const { code, reported } = check()
    expect(code).toBe(1)
    expect(reported.join(' ')).toContain('0 modules cruised')
  })
})
