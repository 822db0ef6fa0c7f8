import { SheetWaiting } from '@/components/shell/sheet-waiting'

export default function Loading() {
  return <SheetWaiting label="Reading the trace" />
}
