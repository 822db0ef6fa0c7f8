// npm run bench: measurements, which take minutes and are therefore no part of npm test.
import { existsSync, readdirSync } from 'node:fs'
import path from 'node:path'
import { projectFolder } from './steps/project-folder.mjs'
import { run } from './steps/run.mjs'

const folder = path.join(projectFolder, 'tests', 'bench')
const programs = existsSync(folder)
  ? readdirSync(folder)
      .filter((name) => name.endsWith('.bench.ts'))
      .sort()
  : []
if (programs.length === 0) console.error('No measurements yet: they live in tests/bench as <what>.bench.ts.')
for (const name of programs) {
  const code = await run(process.execPath, ['--import', 'tsx', path.join(folder, name)], {
    cwd: projectFolder,
  })
  if (code !== 0) process.exitCode = 1
}
