import { randomUUID } from 'node:crypto'
import type { Actor, Context, OpenContext } from '../context'
import { database } from '../database'

export function openContext(): OpenContext {
  return { db: database(), now: new Date(), newId: randomUUID }
}

export function contextFor(actor: Actor): Context {
  return { ...openContext(), actor }
}
