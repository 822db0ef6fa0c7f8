/** What one does with a circuit, for the running head. */
export function circuitModes(circuitId: string, traceHref?: string) {
  return [
    { id: 'operate', label: 'Operate', href: `/circuits/${circuitId}` },
    { id: 'trace', label: 'Trace', href: traceHref ?? `/circuits/${circuitId}/trace` },
  ]
}
