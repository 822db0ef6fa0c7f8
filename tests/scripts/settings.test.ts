import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { parseEnv } from 'node:util'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { projectFolder } from '../../scripts/steps/project-folder.mjs'
import { ensureSettingsFile, fillExample, readSettings } from '../../scripts/steps/settings.mjs'

const example = readFileSync(path.join(projectFolder, '.env.example'), 'utf8')

describe('the settings of an install', () => {
  it('have secrets of their own, no two alike', () => {
    const [one, other] = [parseEnv(fillExample(example)), parseEnv(fillExample(example))]
    const secrets = [one, other].flatMap((env) => [
      env.NEXTAUTH_SECRET,
      new URL(env.DATABASE_URL ?? '').password,
      new URL(env.DATABASE_OWNER_URL ?? '').password,
      env.DEMO_PASSWORD,
    ])
    expect(new Set(secrets).size).toBe(8)
    expect(secrets.filter((secret) => !secret || secret.length < 12)).toEqual([])
    expect(JSON.stringify([one, other])).not.toMatch(/<\w+>/)
  })

  it('are filled in where a copy of the example made by hand still asks, and are then left alone', () => {
    const folder = mkdtempSync(path.join(tmpdir(), 'settings-'))
    try {
      const file = path.join(folder, '.env')
      writeFileSync(file, example.replace(/^PORT=.*/m, 'PORT=4107'))
      expect(ensureSettingsFile(file)).toBe(true)
      const filled = readFileSync(file, 'utf8')
      expect(parseEnv(filled).PORT).toBe('4107')
      expect(JSON.stringify(parseEnv(filled))).not.toMatch(/<\w+>/)
      expect(ensureSettingsFile(file)).toBe(false)
      expect(readFileSync(file, 'utf8')).toBe(filled)
    } finally {
      rmSync(folder, { recursive: true })
    }
  })

  describe('read from the environment', () => {
    beforeEach(() => {
      for (const [name, value] of Object.entries(parseEnv(fillExample(example)))) vi.stubEnv(name, value)
    })
    afterEach(() => vi.unstubAllEnvs())

    it('let the addresses on this machine follow the ports', () => {
      vi.stubEnv('PORT', '4107')
      vi.stubEnv('DATABASE_PORT', '4108')
      const settings = readSettings()
      expect(settings.NEXTAUTH_URL).toBe('http://127.0.0.1:4107')
      expect(new URL(settings.DATABASE_URL ?? '').port).toBe('4108')
      expect(new URL(settings.DATABASE_OWNER_URL ?? '').port).toBe('4108')
    })

    it('leave a public address alone', () => {
      vi.stubEnv('NEXTAUTH_URL', 'https://circuits.shop.example')
      expect(readSettings().NEXTAUTH_URL).toBe('https://circuits.shop.example')
    })

    it.each([
      ['PORT', 'eighty', 'PORT is "eighty"; expected a whole number from 1024 to 65535.'],
      ['PORT', '70000', 'PORT is "70000"; expected a whole number from 1024 to 65535.'],
      ['DATABASE_PORT', '5432', 'DATABASE_PORT is 5432; expected a port below 32768 other than 5432.'],
      ['DATABASE_PORT', '40000', 'DATABASE_PORT is 40000; expected a port below 32768 other than 5432.'],
      ['NEXTAUTH_URL', 'somewhere', 'NEXTAUTH_URL is not an address: "somewhere".'],
    ])('refuse %s = %s with one sentence', (name, value, sentence) => {
      vi.stubEnv(name, value)
      expect(() => readSettings()).toThrow(sentence)
    })
  })
})
