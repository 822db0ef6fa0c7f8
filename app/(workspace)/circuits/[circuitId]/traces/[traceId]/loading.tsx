import { RunningHead } from '@/components/shell/running-head'
import { RuledLines } from '@/components/ui/ruled-lines'

export default function Loading() {
  return (
    <>
      <RunningHead />
      <main className="flex-1 bg-sheet px-4 pt-4 tablet:px-5">
        <RuledLines rows={6} label="Reading the trace" />
      </main>
    </>
  )
}
