import { describe, expect, it } from 'vitest'
import type { Answer } from '@/diagrams/faults/answer'
import { Evaluator, type Thread } from '@/lib/client/evaluator/evaluator'
import type { Asked, Question } from '@/lib/client/evaluator/messages'

const question = (name: string): Question => ({
  circuit: { title: name } as Question['circuit'],
  readings: [],
  codes: [],
  priors: 'trade',
})

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
  answer(index: number) {
    const { number } = this.asked[index] as Asked
    this.onmessage?.({ data: { number, ok: true, answer: { says: `${number}` } as Answer } } as MessageEvent)
  }
}

function open() {
  const threads: HeldThread[] = []
  const answered: string[] = []
  const failed: string[] = []
  const evaluator = new Evaluator(
    () => {
      const thread = new HeldThread()
      threads.push(thread)
      return thread
    },
    {
      answered: (_, asked) => answered.push(asked.circuit.title),
      failed: (message) => failed.push(message),
    },
  )
  return { evaluator, threads, answered, failed }
}

describe('the evaluator in its thread', () => {
  it('is asked one question at a time and only the newest of those that wait', () => {
    const { evaluator, threads, answered } = open()
    for (const name of ['one', 'two', 'three']) evaluator.ask(question(name))
    expect(threads[0]?.asked.map((one) => one.question.circuit.title)).toEqual(['one'])
    threads[0]?.answer(0)
    expect(threads[0]?.asked.map((one) => one.question.circuit.title)).toEqual(['one', 'three'])
    threads[0]?.answer(1)
    expect(answered).toEqual(['three'])
  })

  it('says when its thread cannot start, and starts a new one for the next question', () => {
    const { evaluator, threads, failed, answered } = open()
    evaluator.ask(question('one'))
    threads[0]?.onerror?.({ message: 'no such file' } as ErrorEvent)
    expect(failed).toEqual(['no such file'])
    evaluator.ask(question('two'))
    expect(threads).toHaveLength(2)
    threads[1]?.answer(0)
    expect(answered).toEqual(['two'])
  })
})
