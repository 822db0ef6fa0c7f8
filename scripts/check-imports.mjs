// Checks who imports whom in the given checkout, and that no source file escaped the check.
import { existsSync, readdirSync, readFileSync } from 'node:fs'
import path from 'node:path'
import { projectFolder } from './steps/project-folder.mjs'
import { ask } from './steps/run.mjs'

const sources = ['app', 'components', 'diagrams', 'lib', 'db', 'migrations', 'scripts', 'tests']
const target = path.resolve(process.argv[2] ?? '.')
const roots = [...sources, 'proxy.ts'].filter((name) => existsSync(path.join(target, name)))

const problems =
  roots.length > 0 ? [...importProblems(), ...directiveProblems()] : ['no sources: 0 modules cruised']
for (const problem of problems) console.error(problem)
process.exitCode = problems.length > 0 ? 1 : 0

function importProblems() {
  const cruiser = path.join(projectFolder, 'node_modules/dependency-cruiser/bin/dependency-cruise.mjs')
  const config = path.join(projectFolder, '.dependency-cruiser.cjs')
  const args = [cruiser, '--no-progress', '--config', config, '--output-type', 'json', ...roots]
  const { stdout, stderr } = ask(process.execPath, args, { cwd: target, maxBuffer: 512 * 1024 * 1024 })
  if (!stdout.startsWith('{')) return [`dependency-cruiser failed: ${stderr}`]
  const { modules, summary } = JSON.parse(stdout)
  const read = new Set(modules.map((module) => module.source))
  // A parser that cannot read this TypeScript would find nothing wrong: every file has to have been read.
  const unread = sourceFiles().filter((file) => !read.has(file))
  if (read.size === 0) return ['0 modules cruised']
  return [
    ...unread.map((file) => `not-cruised: ${file}`),
    ...(modules.some((module) => module.dependencies.length > 0)
      ? []
      : ['no import was found in any module']),
    ...summary.violations.map(({ rule, from, to, cycle }) => {
      const chain = cycle ? [from, ...cycle.map((link) => link.name)].join(' → ') : `${from} → ${to}`
      return `${rule.name}: ${chain}`
    }),
  ]
}

/** `"use client"` marks a border of the product; it runs through components/, and where Next itself demands it. */
function directiveProblems() {
  return sourceFiles()
    .filter((file) => !file.startsWith('components/') && !/^app\/(.*\/)?(global-)?error\.tsx$/.test(file))
    .filter((file) =>
      /^\s*(\/\/[^\n]*\n\s*|\/\*[\s\S]*?\*\/\s*)*['"]use client['"]/.test(
        readFileSync(path.join(target, file), 'utf8'),
      ),
    )
    .map((file) => `use-client-in-components-only: ${file}`)
}

function sourceFiles() {
  return roots.flatMap((root) => {
    if (root === 'proxy.ts') return [root]
    return readdirSync(path.join(target, root), { recursive: true })
      .map((name) => path.posix.join(root, String(name)))
      .filter((file) => /\.tsx?$/.test(file) && !file.endsWith('.d.ts'))
  })
}
