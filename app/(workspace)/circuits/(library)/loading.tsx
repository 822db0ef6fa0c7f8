import { RunningHead } from '@/components/shell/running-head'
import { RuledLines } from '@/components/ui/ruled-lines'

export default function Loading() {
  return (
    <>
      <RunningHead />
      <main className="flex-1 bg-sheet px-4 tablet:px-5 pt-4">
        <RuledLines rows={8} label="Reading the circuits" />
      </main>
    </>
  )
}
