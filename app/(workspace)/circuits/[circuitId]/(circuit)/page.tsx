import type { Metadata } from 'next'
import { notFound, redirect } from 'next/navigation'
import { OperateScreen } from '@/components/operate/operate-screen'
import { InBrowser } from '@/components/shell/in-browser'
import { SheetWaiting } from '@/components/shell/sheet-waiting'
import { currentContext } from '@/lib/server/http/session'
import { getCircuit } from '@/lib/server/use-cases/circuits/get-circuit'

export const metadata: Metadata = { title: 'Operate' }

export default async function OperatePage({ params }: { params: Promise<{ circuitId: string }> }) {
  const { circuitId } = await params
  const context = await currentContext()
  if (!context) redirect(`/sign-in?ended=1&to=/circuits/${encodeURIComponent(circuitId)}`)
  const found = await getCircuit(context, { id: circuitId })
  if (!found.ok) notFound()
  return (
    <InBrowser waiting={<SheetWaiting label="Drawing the circuit" />}>
      <OperateScreen circuitId={circuitId} circuit={found.value.document} />
    </InBrowser>
  )
}
