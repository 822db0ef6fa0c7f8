import { useQuery, useQueryClient } from '@tanstack/react-query'
import { useEffect, useMemo, useRef, useState } from 'react'
import type { Reading } from '@/diagrams/document/reading-schema'
import { answerCautions, deleteReading, putReading, traceQuery } from '@/lib/client/api/traces'
import { newId } from '@/lib/client/new-id'
import { OfflineQueue, type QueueState } from '@/lib/client/queue/offline-queue'
import type { Change } from '@/lib/client/queue/kept-changes'
import { readingsWithChanges } from '@/lib/client/queue/readings-with-changes'
import { tabletStore } from '@/lib/client/queue/tablet-store'
import type { Trace } from '@/lib/shared/api/traces'
import { reportSessionEnded } from '../shell/session-ended'

/** A trace with what was entered on this tablet, and the commands that change it. */
export function useTrace(initial: Trace) {
  const queries = useQueryClient()
  const { queryKey } = traceQuery(initial.id)
  const { data: trace, dataUpdatedAt } = useQuery({ ...traceQuery(initial.id), initialData: initial })
  const [changes, setChanges] = useState<Change[]>([])
  const [state, setState] = useState<QueueState>({ kind: 'idle', waiting: 0, savedAt: null })
  const [undone, setUndone] = useState<Reading[]>([])
  const queue = useRef<OfflineQueue | null>(null)

  useEffect(() => {
    const opened = new OfflineQueue(
      initial.id,
      tabletStore(),
      { put: putReading, remove: deleteReading, answerCautions },
      {
        changed(waiting, next) {
          setChanges(waiting)
          setState(next)
          if (next.kind === 'kept' && next.signedOut) reportSessionEnded()
        },
        saved(stored) {
          void queries.cancelQueries({ queryKey })
          queries.setQueryData(queryKey, stored)
        },
        now: () => Date.now(),
        later(milliseconds, run) {
          const timer = setTimeout(run, milliseconds)
          return () => clearTimeout(timer)
        },
      },
    )
    queue.current = opened
    opened.open()
    const again = () => opened.sendNow()
    window.addEventListener('online', again)
    window.addEventListener('focus', again)
    return () => {
      window.removeEventListener('online', again)
      window.removeEventListener('focus', again)
      opened.close()
      queue.current = null
    }
    // The query key is made from the id alone.
    // eslint-disable-next-line react-hooks/exhaustive-deps
  }, [initial.id, queries])

  // The server has answered something: what still waits may go now, too, as after signing in again.
  useEffect(() => {
    if (dataUpdatedAt > 0) queue.current?.sendNow()
  }, [dataUpdatedAt])

  const readings = useMemo(() => readingsWithChanges(trace.readings, changes), [trace.readings, changes])
  return {
    trace,
    readings,
    state,
    cautionsAnswered:
      trace.cautionsAnsweredAt !== null || changes.some((change) => change.kind === 'answer-cautions'),
    canRedo: undone.length > 0,
    enter(reading: Reading) {
      setUndone([])
      queue.current?.add({ kind: 'put', reading })
    },
    undo() {
      const last = readings.at(-1)
      if (!last) return
      setUndone([...undone, last])
      queue.current?.add({ kind: 'remove', readingId: last.id })
    },
    redo() {
      const last = undone.at(-1)
      if (!last) return
      setUndone(undone.slice(0, -1))
      // Under an id of its own: the old one may still be on its way out.
      queue.current?.add({ kind: 'put', reading: { ...last, id: newId() } })
    },
    /** Takes one reading out, such as the one that fits nothing. */
    remove(readingId: string) {
      queue.current?.add({ kind: 'remove', readingId })
    },
    answerCautions() {
      queue.current?.add({ kind: 'answer-cautions' })
    },
    dropRefused() {
      queue.current?.dropRefused()
    },
    sendNow() {
      queue.current?.sendNow()
    },
    /** True once everything entered is with the server. */
    async allSent(): Promise<boolean> {
      return (await queue.current?.drained()) ?? false
    },
    replace(stored: Trace) {
      queries.setQueryData(queryKey, stored)
    },
  }
}

export type TraceWork = ReturnType<typeof useTrace>
