import type { Step, Steps } from '@/diagrams/faults/steps'

/** What a thread tells of the question with that number. */
export type Told<A> =
  | { number: number; taken: true }
  | { number: number; progress: Step }
  | { number: number; ok: true; answer: A }
  | { number: number; ok: false; message: string }
  | { number: number; dropped: true }

/** What the thread lends: its clock, its queue of messages, its way back. */
export interface RunnerHost<A> {
  /** Milliseconds. */
  now(): number
  /** Goes on in a later turn, after the messages that wait. */
  pause(): Promise<void>
  tell(told: Told<A>): void
}

/** Between two looks for something newer. */
export const sliceMilliseconds = 10
/** Work that lasts longer says how far it has come, and says it again that often. */
export const progressMilliseconds = 200

/**
 * Works on the newest question only: one that comes while another is worked on stops that one at the next portion. What
 * the stopped one has learned of the circuit is kept by the engine, so that the next one starts warm.
 */
export class QuestionRunner<Q, A> {
  private newest: { number: number; question: Q } | null = null
  private unwanted = -1
  private running = false

  constructor(
    private readonly work: (question: Q) => Steps<A>,
    private readonly host: RunnerHost<A>,
  ) {}

  ask(number: number, question: Q): void {
    if (this.newest) this.host.tell({ number: this.newest.number, dropped: true })
    this.newest = { number, question }
    if (!this.running) void this.run()
  }

  /** Nobody waits for this answer any more. */
  drop(number: number): void {
    this.unwanted = number
    if (this.newest?.number !== number) return
    this.newest = null
    this.host.tell({ number, dropped: true })
  }

  private async run(): Promise<void> {
    this.running = true
    while (this.newest) {
      const { number, question } = this.newest
      this.newest = null
      this.host.tell({ number, taken: true })
      try {
        await this.answer(number, question)
      } catch (error) {
        this.host.tell({ number, ok: false, message: error instanceof Error ? error.message : String(error) })
      }
    }
    this.running = false
  }

  private async answer(number: number, question: Q): Promise<void> {
    const { host } = this
    const steps = this.work(question)
    let slice = host.now()
    let told = slice
    for (;;) {
      const next = steps.next()
      if (next.done) return host.tell({ number, ok: true, answer: next.value })
      const time = host.now()
      if (time - told >= progressMilliseconds) {
        told = time
        host.tell({ number, progress: next.value })
      }
      if (time - slice < sliceMilliseconds) continue
      await host.pause()
      slice = host.now()
      if (this.newest || this.unwanted === number) return host.tell({ number, dropped: true })
    }
  }
}
