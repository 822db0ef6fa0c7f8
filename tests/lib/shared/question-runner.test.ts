import { describe, expect, it } from 'vitest'
import type { Steps } from '@/diagrams/faults/steps'
import { QuestionRunner, type Told } from '@/lib/shared/evaluator/question-runner'

/** A clock that the work itself moves, and turns that pass only when told. */
function thread(portionMilliseconds: number) {
  let time = 0
  const told: Told<string>[] = []
  const waiting: (() => void)[] = []
  const worked: string[] = []
  function* work(name: string): Steps<string> {
    if (name === 'bad') throw new Error('no such circuit')
    for (let done = 1; done <= 100; done++) {
      time += portionMilliseconds
      worked.push(name)
      yield { stage: 'planning', done, of: 100 }
    }
    return `answer to ${name}`
  }
  const runner = new QuestionRunner<string, string>(work, {
    now: () => time,
    pause: () => new Promise((resolve) => waiting.push(resolve)),
    tell: (one) => told.push(one),
  })
  /** One turn: messages that came in are in already, the work goes on. */
  const turn = async () => {
    waiting.shift()?.()
    await new Promise((resolve) => setImmediate(resolve))
  }
  const turns = async (most = 1000) => {
    for (let i = 0; i < most && waiting.length > 0; i++) await turn()
  }
  const answers = () => told.filter((one) => 'ok' in one)
  return { runner, told, turn, turns, worked, answers }
}

describe('the runner of questions', () => {
  it('gives up its turn every few milliseconds, so that messages come in', async () => {
    const { runner, turn, worked } = thread(4)
    runner.ask(1, 'one')
    // 4 + 4 + 4 are the first to reach 10.
    expect(worked.length).toBe(3)
    await turn()
    expect(worked.length).toBe(6)
  })

  it('stops a question at its next portion when a newer one comes, and answers the newer one', async () => {
    const { runner, told, turn, turns, worked, answers } = thread(4)
    runner.ask(1, 'one')
    await turn()
    runner.ask(2, 'two')
    await turns()
    expect(worked.filter((name) => name === 'one').length).toBe(6)
    expect(told).toContainEqual({ number: 1, dropped: true })
    expect(answers()).toEqual([{ number: 2, ok: true, answer: 'answer to two' }])
  })

  it('of several that come in one turn takes the newest only', async () => {
    const { runner, told, turns, worked, answers } = thread(4)
    for (const [i, name] of ['one', 'two', 'three', 'four'].entries()) runner.ask(i + 1, name)
    await turns()
    expect(new Set(worked)).toEqual(new Set(['one', 'four']))
    expect(
      told
        .filter((one) => 'dropped' in one)
        .map(({ number }) => number)
        .toSorted(),
    ).toEqual([1, 2, 3])
    expect(answers()).toEqual([{ number: 4, ok: true, answer: 'answer to four' }])
  })

  it('answers questions asked one after the other in their order', async () => {
    const { runner, turns, answers } = thread(1)
    for (const [i, name] of ['one', 'two', 'three'].entries()) {
      runner.ask(i + 1, name)
      await turns()
    }
    expect(answers().map(({ number }) => number)).toEqual([1, 2, 3])
  })

  it('says how far it has come once it lasts 200 ms, and no more often', async () => {
    const slow = thread(30)
    slow.runner.ask(1, 'slow')
    await slow.turns()
    const progress = slow.told.filter((one) => 'progress' in one)
    // 3 seconds in all, at most one word each 200 ms, none before the first 200.
    expect(progress.length).toBeGreaterThanOrEqual(10)
    expect(progress.length).toBeLessThanOrEqual(15)
    expect(progress[0]).toEqual({ number: 1, progress: { stage: 'planning', done: 7, of: 100 } })
    const quick = thread(1)
    quick.runner.ask(1, 'quick')
    await quick.turns()
    expect(quick.told.filter((one) => 'progress' in one)).toEqual([])
  })

  it('tells an error and goes on with the next question', async () => {
    const { runner, turns, answers } = thread(4)
    runner.ask(1, 'bad')
    await turns()
    runner.ask(2, 'two')
    await turns()
    expect(answers()).toEqual([
      { number: 1, ok: false, message: 'no such circuit' },
      { number: 2, ok: true, answer: 'answer to two' },
    ])
  })

  it('stops what nobody waits for any more, running or waiting', async () => {
    const { runner, told, turn, turns, answers } = thread(4)
    runner.ask(1, 'one')
    await turn()
    runner.drop(1)
    await turns()
    expect(answers()).toEqual([])
    expect(told.at(-1)).toEqual({ number: 1, dropped: true })
    runner.ask(2, 'two')
    runner.ask(3, 'three')
    runner.drop(3)
    await turns()
    expect(answers()).toEqual([{ number: 2, ok: true, answer: 'answer to two' }])
  })
})
