import type { Reading } from '@/diagrams/document/reading-schema'
import type { Trace } from '@/lib/shared/api/traces'
import type { Called } from '../api/call-api'
import { type Change, readChanges, type Store } from './kept-changes'

export interface Sender {
  put(traceId: string, reading: Reading): Promise<Called<Trace>>
  remove(traceId: string, readingId: string): Promise<Called<Trace>>
  answerCautions(traceId: string): Promise<Called<Trace>>
}

export type QueueState =
  | { kind: 'idle'; waiting: 0; savedAt: number | null }
  | { kind: 'saving'; waiting: number }
  | { kind: 'kept'; waiting: number; message: string; signedOut: boolean }
  | { kind: 'refused'; waiting: number; message: string; change: Change }

export interface QueueHooks {
  /** After every change of the queue or of what became of it. */
  changed(changes: Change[], state: QueueState): void
  /** The trace as the server has it now. */
  saved(trace: Trace): void
  now(): number
  /** Calls back later; returns how to cancel. */
  later(milliseconds: number, run: () => void): () => void
}

const retryMilliseconds = [2_000, 5_000, 10_000, 30_000] as const

/**
 * Readings on their way to the server. Every one is written to the tablet before it is sent and stays there until
 * the server has confirmed it, so a reload, a lost network or a database outage loses nothing. They go one at a
 * time in the order they were entered, each under its own id, so that sending one twice is harmless.
 */
export class OfflineQueue {
  private changes: Change[]
  private state: QueueState
  private sending = false
  private closed = false
  private failures = 0
  private cancelRetry: (() => void) | null = null
  private idleWaiters: (() => void)[] = []

  constructor(
    private readonly traceId: string,
    private readonly store: Store,
    private readonly sender: Sender,
    private readonly hooks: QueueHooks,
  ) {
    this.changes = readChanges(store, keyOf(traceId))
    this.state = this.changes.length > 0 ? { kind: 'saving', waiting: this.changes.length } : idle(null)
  }

  /** Tells what is waiting from an earlier visit and begins to send it. */
  open(): void {
    this.closed = false
    this.tell()
    void this.send()
  }

  close(): void {
    this.closed = true
    this.cancelRetry?.()
    this.cancelRetry = null
  }

  add(change: Change): void {
    this.changes = [...this.changes, change]
    this.keep()
    if (this.state.kind !== 'kept' && this.state.kind !== 'refused')
      this.state = { kind: 'saving', waiting: this.changes.length }
    else this.state = { ...this.state, waiting: this.changes.length }
    this.tell()
    void this.send()
  }

  /** Tries at once: the network is back, or the person asks. */
  sendNow(): void {
    this.cancelRetry?.()
    this.cancelRetry = null
    void this.send()
  }

  /** Lets go of the change that the server refused, after the person has seen why. */
  dropRefused(): void {
    if (this.state.kind !== 'refused') return
    this.changes = this.changes.slice(1)
    this.keep()
    this.state =
      this.changes.length > 0 ? { kind: 'saving', waiting: this.changes.length } : idle(this.hooks.now())
    this.tell()
    void this.send()
  }

  /** Resolves true once nothing waits any more, false when it cannot be sent now. */
  async drained(): Promise<boolean> {
    this.sendNow()
    while (this.sending) await new Promise<void>((resolve) => this.idleWaiters.push(resolve))
    return this.changes.length === 0
  }

  private async send(): Promise<void> {
    if (this.sending || this.closed || this.state.kind === 'refused') return
    this.sending = true
    try {
      while (this.changes.length > 0 && !this.closed) {
        const change = this.changes[0] as Change
        const called = await this.call(change)
        if (called.ok) {
          this.failures = 0
          this.changes = this.changes.slice(1)
          this.keep()
          this.state =
            this.changes.length > 0
              ? { kind: 'saving', waiting: this.changes.length }
              : idle(this.hooks.now())
          this.hooks.saved(called.value)
          this.tell()
          continue
        }
        const signedOut = called.failure.code === 'not-signed-in'
        if (called.failure.tryAgain || signedOut) {
          this.state = {
            kind: 'kept',
            waiting: this.changes.length,
            message: called.failure.message,
            signedOut,
          }
          this.tell()
          this.retryLater()
        } else {
          this.state = {
            kind: 'refused',
            waiting: this.changes.length,
            message: called.failure.message,
            change,
          }
          this.tell()
        }
        break
      }
    } finally {
      this.sending = false
      for (const wake of this.idleWaiters.splice(0)) wake()
    }
  }

  private call(change: Change): Promise<Called<Trace>> {
    switch (change.kind) {
      case 'put':
        return this.sender.put(this.traceId, change.reading)
      case 'remove':
        return this.sender.remove(this.traceId, change.readingId)
      case 'answer-cautions':
        return this.sender.answerCautions(this.traceId)
    }
  }

  private retryLater(): void {
    if (this.closed) return
    const wait = retryMilliseconds[Math.min(this.failures, retryMilliseconds.length - 1)] ?? 30_000
    this.failures++
    this.cancelRetry?.()
    this.cancelRetry = this.hooks.later(wait, () => {
      this.cancelRetry = null
      void this.send()
    })
  }

  private keep(): void {
    const key = keyOf(this.traceId)
    if (this.changes.length === 0) this.store.removeItem(key)
    else this.store.setItem(key, JSON.stringify(this.changes))
  }

  private tell(): void {
    this.hooks.changed(this.changes, this.state)
  }
}

function keyOf(traceId: string): string {
  return `halfsplit.trace.${traceId}`
}

function idle(savedAt: number | null): QueueState {
  return { kind: 'idle', waiting: 0, savedAt }
}
