import { describe, expect, it } from 'vitest'
import type { Answer } from '@/diagrams/faults/answer'
import { Evaluator, silenceMilliseconds, type Thread } from '@/lib/client/evaluator/evaluator'
import type { Answered, Asked, Question } from '@/lib/client/evaluator/messages'
import { WholeQuestions } from '@/lib/client/evaluator/whole-question'

const circuits = new Map<string, Question['circuit']>()
/** The same circuit for the same name, as a trace asks again and again about one. */
function question(name: string, circuitName = 'van'): Question {
  const circuit = circuits.get(circuitName) ?? ({ title: circuitName } as Question['circuit'])
  circuits.set(circuitName, circuit)
  return { circuit, readings: [], codes: [name], priors: 'trade' }
}

class HeldThread implements Thread {
  asked: Asked[] = []
  onmessage: Thread['onmessage'] = null
  onerror: Thread['onerror'] = null
  ended = false
  postMessage(message: Asked) {
    this.asked.push(message)
  }
  terminate() {
    this.ended = true
  }
  tell(told: Answered) {
    this.onmessage?.({ data: told } as MessageEvent)
  }
  take(index: number) {
    this.tell({ number: this.asked[index]!.number, taken: true })
  }
  answer(index: number) {
    const { number } = this.asked[index]!
    this.tell({ number, ok: true, answer: { says: `${number}` } as Answer })
  }
  die(message: string) {
    this.onerror?.({ message } as ErrorEvent)
  }
}

function open() {
  const threads: HeldThread[] = []
  const answered: string[] = []
  const failed: string[] = []
  const progress: string[] = []
  const timers = new Set<{ milliseconds: number; run: () => void }>()
  const evaluator = new Evaluator(
    () => {
      const thread = new HeldThread()
      threads.push(thread)
      return thread
    },
    {
      answered: (_, asked) => answered.push(asked.codes[0]!),
      failed: (message, asked) => failed.push(`${asked.codes[0]}: ${message}`),
      progressed: ({ stage, done, of }, asked) => progress.push(`${asked.codes[0]}: ${stage} ${done}/${of}`),
      later(milliseconds, run) {
        const timer = { milliseconds, run }
        timers.add(timer)
        return () => timers.delete(timer)
      },
    },
  )
  const names = (thread = 0) => threads[thread]!.asked.map((one) => one.question.codes[0])
  return { evaluator, threads, answered, failed, progress, timers, names }
}

describe('the evaluator in its thread', () => {
  it('gets a newer question at once, and only the newest of those asked before it has taken that up', () => {
    const { evaluator, threads, answered, names } = open()
    evaluator.ask(question('one'))
    threads[0]!.take(0)
    for (const name of ['two', 'three', 'four']) evaluator.ask(question(name))
    expect(names()).toEqual(['one', 'two'])
    threads[0]!.tell({ number: threads[0]!.asked[0]!.number, dropped: true })
    threads[0]!.take(1)
    expect(names()).toEqual(['one', 'two', 'four'])
    threads[0]!.answer(1)
    threads[0]!.answer(2)
    expect(answered).toEqual(['four'])
  })

  it('is sent a circuit once, not with every reading', () => {
    const { evaluator, threads } = open()
    const whole = new WholeQuestions()
    for (const [name, circuit] of [
      ['one', 'van'],
      ['two', 'van'],
      ['three', 'truck'],
      ['four', 'truck'],
    ] as const) {
      evaluator.ask(question(name, circuit))
      threads[0]!.answer(threads[0]!.asked.length - 1)
    }
    expect(threads[0]!.asked.map((one) => one.question.circuit?.title)).toEqual([
      'van',
      undefined,
      'truck',
      undefined,
    ])
    expect(threads[0]!.asked.map((one) => whole.open(one).circuit.title)).toEqual([
      'van',
      'van',
      'truck',
      'truck',
    ])
  })

  it('tells an answer that comes late to nobody, nor how far it has come', () => {
    const { evaluator, threads, answered, progress } = open()
    evaluator.ask(question('one'))
    threads[0]!.take(0)
    const late = threads[0]!.asked[0]!.number
    threads[0]!.tell({ number: late, progress: { stage: 'circuit', done: 3, of: 9 } })
    evaluator.ask(question('two'))
    threads[0]!.tell({ number: late, progress: { stage: 'circuit', done: 4, of: 9 } })
    threads[0]!.answer(0)
    threads[0]!.answer(1)
    expect(answered).toEqual(['two'])
    expect(progress).toEqual(['one: circuit 3/9'])
  })

  it('tells an error of the engine, and answers the next question in the same thread', () => {
    const { evaluator, threads, answered, failed } = open()
    evaluator.ask(question('one'))
    threads[0]!.tell({ number: threads[0]!.asked[0]!.number, ok: false, message: 'no such wire' })
    evaluator.ask(question('two'))
    threads[0]!.answer(1)
    expect([threads.length, failed, answered]).toEqual([1, ['one: no such wire'], ['two']])
  })

  it('starts a thread anew that has died, with the whole question', () => {
    const { evaluator, threads, answered, failed } = open()
    evaluator.ask(question('one'))
    threads[0]!.answer(0)
    evaluator.ask(question('two'))
    threads[0]!.die('out of memory')
    expect([threads.length, threads[0]!.ended]).toEqual([2, true])
    expect(threads[1]!.asked[0]!.question.circuit?.title).toBe('van')
    threads[1]!.answer(0)
    expect([answered, failed]).toEqual([['one', 'two'], []])
  })

  it('says when it dies a second time over the same question, and starts a new one for the next', () => {
    const { evaluator, threads, answered, failed } = open()
    evaluator.ask(question('one'))
    threads[0]!.die('no such file')
    threads[1]!.die('no such file')
    expect(failed).toEqual(['one: no such file'])
    evaluator.ask(question('two'))
    threads[2]!.answer(0)
    expect(answered).toEqual(['two'])
  })

  it('takes a thread for dead that says nothing for a minute, and none that says how far it is', () => {
    const { evaluator, threads, timers, answered } = open()
    evaluator.ask(question('one'))
    const [first] = timers
    threads[0]!.take(0)
    // Called off and set again by every word.
    expect(timers.has(first!)).toBe(false)
    expect([...timers].map(({ milliseconds }) => milliseconds)).toEqual([silenceMilliseconds])
    ;[...timers][0]!.run()
    expect([threads.length, threads[0]!.ended]).toEqual([2, true])
    threads[1]!.answer(0)
    expect(answered).toEqual(['one'])
    // Nothing asked, nothing watched.
    expect(timers.size).toBe(0)
  })

  it('ends its thread when it is closed, and tells nothing more', () => {
    const { evaluator, threads, answered, timers } = open()
    evaluator.ask(question('one'))
    evaluator.close()
    threads[0]!.answer(0)
    expect([threads[0]!.ended, answered, timers.size]).toEqual([true, [], 0])
  })
})
