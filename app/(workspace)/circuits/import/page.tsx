import type { Metadata } from 'next'
import { notFound, redirect } from 'next/navigation'
import { ImportScreen } from '@/components/circuits/import-screen'
import { RunningHead } from '@/components/shell/running-head'
import { currentActor } from '@/lib/server/http/session'
import { can } from '@/lib/shared/permissions'

export const metadata: Metadata = { title: 'Bring in a circuit' }

export default async function ImportPage() {
  const actor = await currentActor()
  if (!actor) redirect('/sign-in?ended=1&to=/circuits/import')
  // What one may not do is not there: the same answer as for an address that leads nowhere.
  if (!can(actor.role, 'circuit.create')) notFound()
  return (
    <>
      <RunningHead />
      <main className="flex-1 bg-tray px-4 tablet:px-5 py-5">
        <div className="mx-auto w-full max-w-4xl">
          <h1 className="text-title">Bring in a circuit</h1>
          <p className="mt-1 mb-5 max-w-2xl text-body text-ink-2">
            A circuit document holds the parts, wires, connectors and codes of one circuit. It is checked
            before anything is stored.
          </p>
          <ImportScreen />
        </div>
      </main>
    </>
  )
}
