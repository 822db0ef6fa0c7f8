import { describe, expect, it } from 'vitest'
import { restCondition } from '@/diagrams/document/condition-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import type { Called } from '@/lib/client/api/call-api'
import type { Change, Store } from '@/lib/client/queue/kept-changes'
import { OfflineQueue, type QueueState } from '@/lib/client/queue/offline-queue'
import { readingsWithChanges } from '@/lib/client/queue/readings-with-changes'
import { savedWords } from '@/lib/client/queue/saved-words'
import type { Trace } from '@/lib/shared/api/traces'

const reading = (id: string, value = 12.5): Reading => ({
  id,
  kind: 'volts',
  red: 'f3.out',
  black: 'chassis',
  value,
  condition: restCondition,
})
const away: Called<never> = {
  ok: false,
  failure: { code: 'database-away', message: 'The database cannot be reached.', tryAgain: true },
}

/** A server that keeps what it is sent, and can be away or refuse. */
function makeServer() {
  const stored: Reading[] = []
  const calls: string[] = []
  const server = {
    stored,
    calls,
    away: false,
    refuse: null as string | null,
    /** Answers only when let go, to catch what happens in between. */
    async answer(call: string, run: () => void): Promise<Called<Trace>> {
      calls.push(call)
      await Promise.resolve()
      if (server.away) return away
      if (server.refuse === call)
        return {
          ok: false,
          failure: {
            code: 'reading-refused',
            message: 'Ohms needs the battery disconnected.',
            tryAgain: false,
          },
        }
      run()
      return { ok: true, value: { readings: [...stored] } as unknown as Trace }
    },
    put: (_: string, one: Reading) =>
      server.answer(`put ${one.id}`, () => {
        const at = stored.findIndex((other) => other.id === one.id)
        if (at < 0) stored.push(one)
        else stored[at] = one
      }),
    remove: (_: string, id: string) =>
      server.answer(`remove ${id}`, () => {
        const at = stored.findIndex((other) => other.id === id)
        if (at >= 0) stored.splice(at, 1)
      }),
    answerCautions: () => server.answer('cautions', () => undefined),
  }
  return server
}

function makeStore(): Store & { kept: Map<string, string> } {
  const kept = new Map<string, string>()
  return {
    kept,
    getItem: (key) => kept.get(key) ?? null,
    setItem: (key, value) => void kept.set(key, value),
    removeItem: (key) => void kept.delete(key),
  }
}

function openQueue(server: ReturnType<typeof makeServer>, store: Store) {
  const seen: { changes: Change[]; state: QueueState | null; timers: (() => void)[]; saves: number } = {
    changes: [],
    state: null,
    timers: [],
    saves: 0,
  }
  const queue = new OfflineQueue('trace-1', store, server, {
    changed: (changes, state) => {
      seen.changes = changes
      seen.state = state
    },
    saved: () => {
      seen.saves++
    },
    now: () => 1000,
    later: (_, run) => {
      seen.timers.push(run)
      return () => undefined
    },
  })
  queue.open()
  return { queue, seen }
}

describe('readings on their way to the server', () => {
  it('are sent one after the other in the order they were entered', async () => {
    const server = makeServer()
    const { queue, seen } = openQueue(server, makeStore())
    queue.add({ kind: 'put', reading: reading('a') })
    queue.add({ kind: 'put', reading: reading('b') })
    queue.add({ kind: 'remove', readingId: 'a' })
    expect(await queue.drained()).toBe(true)
    expect(server.calls).toEqual(['put a', 'put b', 'remove a'])
    expect(server.stored.map((one) => one.id)).toEqual(['b'])
    expect(seen.state).toEqual({ kind: 'idle', waiting: 0, savedAt: 1000 })
  })

  it('stay on the tablet while the database is away and go out by themselves once it is back', async () => {
    const server = makeServer()
    const store = makeStore()
    server.away = true
    const { queue, seen } = openQueue(server, store)
    queue.add({ kind: 'put', reading: reading('a') })
    queue.add({ kind: 'put', reading: reading('b') })
    queue.add({ kind: 'put', reading: reading('c') })
    expect(await queue.drained()).toBe(false)
    expect(seen.state).toMatchObject({ kind: 'kept', waiting: 3 })
    expect(savedWords(seen.state as QueueState, () => '')).toBe('Offline, 3 readings kept on this tablet')
    expect(JSON.parse(store.kept.get('halfsplit.trace.trace-1') ?? '[]')).toHaveLength(3)
    server.away = false
    seen.timers.at(-1)?.()
    expect(await queue.drained()).toBe(true)
    expect(server.stored.map((one) => one.id)).toEqual(['a', 'b', 'c'])
    expect(store.kept.size).toBe(0)
  })

  it('come back after a reload and are sent then', async () => {
    const server = makeServer()
    const store = makeStore()
    server.away = true
    const first = openQueue(server, store)
    first.queue.add({ kind: 'put', reading: reading('a', 0.01) })
    await first.queue.drained()
    first.queue.close()
    const second = openQueue(server, store)
    expect(readingsWithChanges([], second.seen.changes)).toEqual([reading('a', 0.01)])
    server.away = false
    expect(await second.queue.drained()).toBe(true)
    expect(server.stored).toEqual([reading('a', 0.01)])
  })

  it('do no harm when the answer to the first sending was lost', async () => {
    const server = makeServer()
    server.stored.push(reading('a'))
    const { queue } = openQueue(server, makeStore())
    queue.add({ kind: 'put', reading: reading('a') })
    await queue.drained()
    expect(server.stored).toEqual([reading('a')])
  })

  it('stop at one that the server refuses, say why, and go on once it is taken out', async () => {
    const server = makeServer()
    server.refuse = 'put a'
    const { queue, seen } = openQueue(server, makeStore())
    queue.add({ kind: 'put', reading: reading('a') })
    queue.add({ kind: 'put', reading: reading('b') })
    expect(await queue.drained()).toBe(false)
    expect(seen.state).toMatchObject({ kind: 'refused', message: 'Ohms needs the battery disconnected.' })
    expect(server.stored).toEqual([])
    queue.dropRefused()
    expect(await queue.drained()).toBe(true)
    expect(server.stored.map((one) => one.id)).toEqual(['b'])
  })

  it('survive a spoilt entry beside them', () => {
    const store = makeStore()
    store.setItem(
      'halfsplit.trace.trace-1',
      JSON.stringify([
        { kind: 'put', reading: { id: 'broken' } },
        { kind: 'put', reading: reading('b') },
      ]),
    )
    const server = makeServer()
    server.away = true
    const { seen } = openQueue(server, store)
    expect(seen.changes).toEqual([{ kind: 'put', reading: reading('b') }])
  })
})
