import type { Answer } from '@/diagrams/faults/answer'
import type { Answered, Asked, Question } from './messages'

/** The part of a Worker that is used here, so that a test can stand in for the thread. */
export interface Thread {
  postMessage(message: Asked): void
  onmessage: ((event: MessageEvent<Answered>) => void) | null
  onerror: ((event: ErrorEvent) => void) | null
  terminate(): void
}

export interface Listener {
  answered(answer: Answer, question: Question): void
  failed(message: string, question: Question): void
}

/**
 * Asks one question at a time. While the thread is busy only the newest question waits: those typed past are
 * dropped, and an answer to a question no longer asked is not told.
 */
export class Evaluator {
  private thread: Thread | null = null
  private number = 0
  private busyWith: Asked | null = null
  private waiting: Asked | null = null

  constructor(
    private readonly start: () => Thread,
    private readonly listener: Listener,
  ) {}

  ask(question: Question): void {
    this.waiting = { number: ++this.number, question }
    if (!this.busyWith) this.sendWaiting()
  }

  close(): void {
    this.thread?.terminate()
    this.thread = null
    this.busyWith = null
    this.waiting = null
  }

  private sendWaiting(): void {
    const next = this.waiting
    if (!next) return
    this.waiting = null
    this.busyWith = next
    this.openThread().postMessage(next)
  }

  private openThread(): Thread {
    if (this.thread) return this.thread
    const thread = this.start()
    thread.onmessage = (event) => this.receive(event.data)
    thread.onerror = (event) => {
      // A thread that could not be loaded answers nothing more: the next question starts a new one.
      const asked = this.busyWith
      this.thread?.terminate()
      this.thread = null
      this.busyWith = null
      if (asked && asked.number === this.number)
        this.listener.failed(event.message || 'The evaluator did not start. Reload the page.', asked.question)
      this.sendWaiting()
    }
    this.thread = thread
    return thread
  }

  private receive(answered: Answered): void {
    const asked = this.busyWith
    if (!asked || answered.number !== asked.number) return
    this.busyWith = null
    if (asked.number === this.number) {
      if (answered.ok) this.listener.answered(answered.answer, asked.question)
      else this.listener.failed(answered.message, asked.question)
    }
    this.sendWaiting()
  }
}
