import { spawnSync } from 'node:child_process'
import { existsSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { setTimeout as wait } from 'node:timers/promises'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { returnLease, takeLease } from '../../scripts/steps/lease.mjs'
import { withLock } from '../../scripts/steps/lock.mjs'

let folder: string
beforeEach(() => {
  folder = mkdtempSync(path.join(tmpdir(), 'lock-'))
})
afterEach(() => rmSync(folder, { recursive: true, force: true }))

/** The number of a process that has ended. */
const endedPid = () => spawnSync(process.execPath, ['-e', '']).pid

describe('the lock around a shared server', () => {
  it('lets one at a time in', async () => {
    const lock = path.join(folder, 'lock')
    let inside = 0
    let most = 0
    const work = async () => {
      inside += 1
      most = Math.max(most, inside)
      await wait(20)
      inside -= 1
    }
    await Promise.all([withLock(lock, work), withLock(lock, work), withLock(lock, work)])
    expect(most).toBe(1)
    expect(existsSync(lock)).toBe(false)
  })

  it('is taken over from a process that died with it', async () => {
    const lock = path.join(folder, 'lock')
    mkdirSync(lock)
    writeFileSync(path.join(lock, 'pid'), String(endedPid()))
    expect(await withLock(lock, () => 'in')).toBe('in')
  })

  it('opens again after work that failed', async () => {
    const lock = path.join(folder, 'lock')
    await expect(withLock(lock, () => Promise.reject(new Error('broken')))).rejects.toThrow('broken')
    expect(await withLock(lock, () => 'in')).toBe('in')
  })
})

describe('the leases of a shared server', () => {
  it('say that nobody is left only when the last living user has gone', () => {
    const leases = path.join(folder, 'leases')
    takeLease(leases)
    takeLease(leases, process.ppid)
    takeLease(leases, endedPid())
    expect(returnLease(leases)).toBe(false)
    expect(returnLease(leases, process.ppid)).toBe(true)
  })
})
