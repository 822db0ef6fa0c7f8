import { spawnSync } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { describe, expect, it } from 'vitest'
import { projectFolder } from '../../scripts/steps/project-folder.mjs'

/** Compiles one file with the settings of `diagrams/`. */
function compile(source: string): { code: number | null; output: string } {
  // Beside node_modules, so that nothing but the settings decides what the file can see.
  const folder = mkdtempSync(path.join(projectFolder, 'node_modules', '.pure-'))
  try {
    writeFileSync(path.join(folder, 'planted.ts'), source)
    writeFileSync(
      path.join(folder, 'tsconfig.json'),
      JSON.stringify({ extends: '../../diagrams/tsconfig.json', include: ['planted.ts'], exclude: [] }),
    )
    const tsc = path.join(projectFolder, 'node_modules', 'typescript', 'bin', 'tsc')
    const { status, stdout } = spawnSync(process.execPath, [tsc, '-p', folder, '--noEmit'], {
      encoding: 'utf8',
    })
    return { code: status, output: stdout }
  } finally {
    rmSync(folder, { recursive: true, force: true })
  }
}

describe('diagrams/ compiles without a browser and without Node', () => {
  it('lets pure code through', () => {
    expect(compile('export const half = (ohms: number): number => Math.sqrt(ohms) / 2')).toEqual({
      code: 0,
      output: '',
    })
  })

  it('refuses every stray global', () => {
    const strays = [
      'window',
      'document',
      'process',
      'console',
      'setTimeout',
      'fetch',
      'crypto',
      'performance',
      'Buffer',
    ]
    const { code, output } = compile(strays.map((name) => `export const stray_${name} = ${name}`).join('\n'))
    expect(code).not.toBe(0)
    expect(strays.filter((name) => !output.includes(`Cannot find name '${name}'`))).toEqual([])
  })
})
