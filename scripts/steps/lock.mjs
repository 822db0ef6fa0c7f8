import { mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { setTimeout as wait } from 'node:timers/promises'
import { Refusal } from './refusal.mjs'

const patienceMs = 300_000

/**
 * Lets one process at a time do `work`. The lock is a folder (made in one indivisible step) holding its owner's
 * process number; the lock of a process that died is taken over.
 * @template T
 * @param {string} folder
 * @param {() => T | Promise<T>} work
 * @returns {Promise<T>}
 */
export async function withLock(folder, work) {
  const begun = Date.now()
  mkdirSync(path.dirname(folder), { recursive: true })
  while (!take(folder)) {
    if (Date.now() - begun > patienceMs)
      throw new Refusal(`Waited 5 minutes for ${folder}; delete it if nothing else runs.`)
    await wait(50)
  }
  try {
    return await work()
  } finally {
    rmSync(folder, { recursive: true, force: true })
  }
}

function take(folder) {
  try {
    mkdirSync(folder)
    writeFileSync(path.join(folder, 'pid'), String(process.pid))
    return true
  } catch (error) {
    if (error.code !== 'EEXIST') throw error
    if (!isHeld(folder)) rmSync(folder, { recursive: true, force: true })
    return false
  }
}

function isHeld(folder) {
  try {
    return isAlive(Number(readFileSync(path.join(folder, 'pid'), 'utf8')))
  } catch {
    // Between mkdir and the writing of the number the lock is held although it names nobody.
    return true
  }
}

/** @param {number} pid */
export function isAlive(pid) {
  if (!pid) return true
  try {
    process.kill(pid, 0)
    return true
  } catch (error) {
    return error.code === 'EPERM'
  }
}
