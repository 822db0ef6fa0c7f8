import { monitorEventLoopDelay } from 'node:perf_hooks'
import { beforeAll, describe, expect, it } from 'vitest'
import type { Tables } from '@/db/tables/database'
import { evaluateApart, evaluatorReady } from '@/lib/server/evaluator/evaluate-apart'
import { evaluateRequest } from '@/lib/server/use-cases/evaluations/evaluate-request'
import { withDatabase } from '../support/database'
import { randomCircuit } from '../support/random-circuit'
import { call } from './support/call'
import { exampleRequest } from './support/example'
import { makeShop, type Person } from './support/shop'

describe('the evaluator behind the address', () => {
  const database = withDatabase<Tables>()
  let who: Person

  beforeAll(async () => {
    who = (await makeShop(database, 'Alder Lane')).people.technician
    // The thread is started by the first question.
    await evaluateRequest(who.context, exampleRequest())
  })

  it('answers the example of the format page', async () => {
    const answer = await call(who, 'POST', 'evaluations', exampleRequest())
    expect([answer.status, answer.body.outcome, answer.body.sites[0].site]).toEqual([
      200,
      'located',
      'wire:w5',
    ])
  })

  it('holds up nobody while it works on a circuit that is too much for it, and says so', async () => {
    const request = { circuit: randomCircuit(3, 40) }
    const delay = monitorEventLoopDelay({ resolution: 10 })
    delay.enable()
    const result = await evaluateRequest(who.context, request, { milliseconds: 300 })
    delay.disable()
    expect(result.ok ? '' : result.failure.code).toBe('evaluation-too-long')
    expect(delay.max / 1e6).toBeLessThan(700)
    const next = await call(who, 'POST', 'evaluations', exampleRequest())
    expect([next.status, next.body.outcome]).toEqual([200, 'located'])
  })

  it('keeps what it knows of circuits when it gives a question up', async () => {
    const before = await evaluatorReady()
    const result = await evaluateRequest(
      who.context,
      { circuit: randomCircuit(4, 40) },
      { milliseconds: 300 },
    )
    expect(result.ok ? '' : result.failure.code).toBe('evaluation-too-long')
    expect(await evaluatorReady()).toBe(before)
  })

  it('leaves a question whose asker has gone, working on it or still waiting, and answers the next', async () => {
    const [first, second] = [new AbortController(), new AbortController()]
    const replies = [
      evaluateApart({ circuit: randomCircuit(3, 40) }, 30_000, first.signal),
      evaluateApart({ circuit: randomCircuit(6, 40) }, 30_000, second.signal),
      evaluateApart(exampleRequest(), 30_000),
    ]
    await new Promise((resolve) => setTimeout(resolve, 300))
    const started = performance.now()
    second.abort()
    first.abort()
    const [working, waiting, answered] = await Promise.all(replies)
    expect([working, waiting]).toEqual(['gone', 'gone'])
    expect(answered).toMatchObject({ ok: true, value: { outcome: 'located' } })
    // Either of the two that were left would have been worked on until its 30 seconds were over.
    expect(performance.now() - started).toBeLessThan(25_000)
  }, 60_000)

  it('starts a thread anew that has died over a question, for the next one', async () => {
    const asked = evaluateApart({ circuit: randomCircuit(7, 40) }, 30_000)
    const thread = await evaluatorReady()
    await new Promise((resolve) => setTimeout(resolve, 200))
    await Promise.all([expect(asked).rejects.toThrow(/thread ended/), thread.terminate()])
    const next = await call(who, 'POST', 'evaluations', exampleRequest())
    expect([next.status, next.body.outcome]).toEqual([200, 'located'])
    expect(await evaluatorReady()).not.toBe(thread)
  })

  it('answers questions asked at once in their order, and turns away what it cannot keep waiting', async () => {
    const replies = await Promise.all(Array.from({ length: 12 }, () => evaluateApart({ circuit: 5 }, 5000)))
    const busy = replies.filter((reply) => reply === 'busy')
    expect(busy.length).toBe(4)
    expect(replies[0]).toEqual({
      ok: false,
      problems: [{ path: 'circuit', message: '5: expected an object' }],
    })
  })
})
