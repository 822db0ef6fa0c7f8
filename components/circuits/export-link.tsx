import { type ButtonLook, buttonClass } from '../ui/button'

/** The circuit document as a file, as it is stored. */
export function ExportLink({ circuitId, size, look }: { circuitId: string } & ButtonLook) {
  return (
    <a
      href={`/api/v1/circuits/${encodeURIComponent(circuitId)}/document`}
      download
      className={buttonClass({ size, look })}
    >
      Save the document
    </a>
  )
}
