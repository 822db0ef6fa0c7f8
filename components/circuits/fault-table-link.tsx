import { type ButtonLook, buttonClass } from '../ui/button'

/** What every fault would show at every point in every condition, as a sheet for a spreadsheet. */
export function FaultTableLink({ circuitId, size, look }: { circuitId: string } & ButtonLook) {
  return (
    <a
      href={`/api/v1/circuits/${encodeURIComponent(circuitId)}/fault-table`}
      download
      title="Every fault at every point in every condition. A large circuit takes minutes."
      className={buttonClass({ size, look })}
    >
      Save the fault table
    </a>
  )
}
