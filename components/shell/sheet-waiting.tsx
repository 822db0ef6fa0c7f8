import { RuledLines } from '../ui/ruled-lines'
import { RunningHead } from './running-head'

/** Where a drawing will be. */
export function SheetWaiting({ label }: { label: string }) {
  return (
    <>
      <RunningHead />
      <main className="flex-1 bg-sheet px-4 pt-4 tablet:px-5">
        <RuledLines rows={6} label={label} />
      </main>
    </>
  )
}
