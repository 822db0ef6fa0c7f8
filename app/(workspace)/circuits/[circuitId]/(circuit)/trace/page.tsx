import type { Metadata } from 'next'
import { notFound, redirect } from 'next/navigation'
import { StartTraceScreen } from '@/components/trace/start/start-trace-screen'
import { currentContext } from '@/lib/server/http/session'
import { getCircuit } from '@/lib/server/use-cases/circuits/get-circuit'

export const metadata: Metadata = { title: 'Start a trace' }

export default async function StartTracePage({ params }: { params: Promise<{ circuitId: string }> }) {
  const { circuitId } = await params
  const context = await currentContext()
  if (!context) redirect(`/sign-in?ended=1&to=/circuits/${encodeURIComponent(circuitId)}/trace`)
  const found = await getCircuit(context, { id: circuitId })
  if (!found.ok) notFound()
  return <StartTraceScreen circuitId={circuitId} circuit={found.value.document} />
}
