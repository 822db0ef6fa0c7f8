import { notFound } from 'next/navigation'
import type { ReactNode } from 'react'
import { currentContext } from '@/lib/server/http/session'
import { hasTrace } from '@/lib/server/use-cases/traces/has-trace'

/** Answers 404 before the loading state is sent with 200. The circuit may be gone from the library: its traces stay. */
export default async function TraceLayout({
  params,
  children,
}: {
  params: Promise<{ circuitId: string; traceId: string }>
  children: ReactNode
}) {
  const { circuitId, traceId } = await params
  const context = await currentContext()
  if (context && !(await hasTrace(context, { id: traceId, circuitId }))) notFound()
  return children
}
