import type { Metadata } from 'next'
import { notFound, redirect } from 'next/navigation'
import { TraceScreen } from '@/components/trace/trace-screen'
import { InBrowser } from '@/components/shell/in-browser'
import { SheetWaiting } from '@/components/shell/sheet-waiting'
import { currentContext } from '@/lib/server/http/session'
import { getTrace } from '@/lib/server/use-cases/traces/get-trace'

export const metadata: Metadata = { title: 'Trace' }

export default async function TracePage({
  params,
}: {
  params: Promise<{ circuitId: string; traceId: string }>
}) {
  const { circuitId, traceId } = await params
  const context = await currentContext()
  if (!context)
    redirect(
      `/sign-in?ended=1&to=/circuits/${encodeURIComponent(circuitId)}/traces/${encodeURIComponent(traceId)}`,
    )
  const found = await getTrace(context, { id: traceId })
  // The address names both: a trace under a circuit that is not its own is not there.
  if (!found.ok || found.value.circuit.id !== circuitId) notFound()
  return (
    <InBrowser waiting={<SheetWaiting label="Drawing the circuit" />}>
      <TraceScreen initial={found.value} />
    </InBrowser>
  )
}
