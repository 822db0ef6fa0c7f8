import { spawnSync } from 'node:child_process'
import path from 'node:path'
import { describe, expect, it } from 'vitest'
import { projectFolder } from '../../scripts/steps/project-folder.mjs'
import { exampleRequest } from '../app/support/example'

/** What the command prints for these lines, one parsed answer each. */
function answersTo(text: string) {
  const { stdout, status } = spawnSync(
    process.execPath,
    ['--import', 'tsx', path.join(projectFolder, 'scripts/evaluate.ts')],
    { cwd: projectFolder, input: text, encoding: 'utf8', maxBuffer: 64 * 1024 * 1024 },
  )
  const lines = stdout.split('\n')
  return { status, ended: lines.pop(), answers: lines.map((line) => JSON.parse(line)) }
}

describe('the command that evaluates lines', () => {
  it('answers every line in its place, whatever stands in it', () => {
    const request = exampleRequest()
    // These part lines for some readers, but stand inside a text here.
    request.circuit.title = 'a\u2028b\u2029c'
    const long = { ...exampleRequest(), circuit: { ...request.circuit, title: 'x'.repeat(3_000_000) } }
    const lines = ['garbage', '', '   ', 'null', JSON.stringify(request), '{"circuit":', JSON.stringify(long)]
    const { status, ended, answers } = answersTo(`${lines.join('\r\n')}\r\n`)
    expect([status, ended, answers.length]).toEqual([0, '', lines.length])
    expect(answers[0].error.message).toMatch(/^not JSON/)
    expect(answers[1].error).toEqual({ path: '', message: 'empty line: expected a request' })
    expect(answers[2].error).toEqual({ path: '', message: 'empty line: expected a request' })
    expect(answers[3].error).toEqual({ path: '', message: 'null: expected an object' })
    expect([answers[4].outcome, answers[4].sites[0].site]).toEqual(['located', 'wire:w5'])
    expect(answers[5].error.message).toMatch(/^not JSON/)
    expect(answers[6].error).toEqual({
      path: 'circuit.title',
      message: 'expected at most 120 characters',
    })
  })
})
