// npm run bench: measurements, which take minutes and are therefore no part of npm test.
//   npm run bench -- --only clearance,speed --runs 100000
// runs those in tests/bench whose name begins so; every other argument goes to the measurements. A whole run
// also keeps its figures beside its goals in tests/bench/results-<date>.md.
import { existsSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { build } from 'vite'
import { projectFolder } from './steps/project-folder.mjs'
import { run } from './steps/run.mjs'
import { resultsTable } from './steps/results-table.mjs'

const folder = path.join(projectFolder, 'tests', 'bench')
const built = path.join(projectFolder, 'node_modules', '.cache', 'halfsplit-bench', String(process.pid))
const given = process.argv.slice(2)
const at = given.indexOf('--only')
const only = at < 0 ? null : given.splice(at, 2)[1].split(',')
const names = readdirSync(folder)
  .filter((name) => name.endsWith('.bench.ts'))
  .map((name) => name.slice(0, -'.bench.ts'.length))
  .filter((name) => !only || only.some((start) => name.startsWith(start)))
  .sort()

if (names.length === 0) {
  console.error(`No measurement in tests/bench begins with ${only?.join(' or ')}.`)
  process.exitCode = 1
} else {
  try {
    await measure()
  } finally {
    rmSync(built, { recursive: true, force: true })
  }
}

async function measure() {
  // Bundled as for production: a loader that keeps every function's name would be measured along with the code.
  await build({
    configFile: false,
    root: projectFolder,
    logLevel: 'error',
    resolve: { alias: { '@': projectFolder } },
    build: {
      ssr: true,
      target: 'node20',
      minify: false,
      outDir: built,
      emptyOutDir: true,
      rollupOptions: {
        input: Object.fromEntries(names.map((name) => [name, path.join(folder, `${name}.bench.ts`)])),
        output: { entryFileNames: '[name].mjs', chunkFileNames: '[name]-[hash].mjs' },
      },
    },
  })
  const rows = path.join(built, 'rows.jsonl')
  for (const name of names) {
    console.log(`\n— ${name}`)
    const code = await run(process.execPath, [path.join(built, `${name}.mjs`), ...given, '--rows', rows], {
      cwd: projectFolder,
    })
    if (code !== 0) process.exitCode = 1
  }
  if (only || !existsSync(rows)) return
  const date = new Date().toISOString().slice(0, 10)
  const kept = readFileSync(rows, 'utf8')
    .trim()
    .split('\n')
    .map((line) => JSON.parse(line))
  writeFileSync(path.join(folder, `results-${date}.md`), resultsTable(date, given, kept))
  console.log(`\nKept in tests/bench/results-${date}.md`)
}
