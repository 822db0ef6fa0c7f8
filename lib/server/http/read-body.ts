import { fail, type Result, succeed } from '@/lib/shared/result'

export const mostBodyBytes = 2 * 1024 * 1024
/** Far more than any document needs; what nests without end would exhaust the stack of whoever walks through it. */
const mostLevels = 64

/** The JSON body. One over 2 MB is refused at the byte that is too many, without reading on. */
export async function readJsonBody(request: Request): Promise<Result<unknown>> {
  const type = request.headers.get('content-type') ?? ''
  if (!/^application\/json\s*(;|$)/i.test(type)) return fail('not-json')
  if (Number(request.headers.get('content-length') ?? 0) > mostBodyBytes) return fail('too-large')
  const chunks: Uint8Array[] = []
  let bytes = 0
  const reader = request.body?.getReader()
  while (reader) {
    const { done, value } = await reader.read()
    if (done) break
    bytes += value.byteLength
    if (bytes > mostBodyBytes) {
      await reader.cancel().catch(() => {})
      return fail('too-large')
    }
    chunks.push(value)
  }
  let value: unknown
  try {
    value = JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(Buffer.concat(chunks)))
  } catch {
    return fail('bad-request', { message: 'The body is not JSON.' })
  }
  if (nestsDeeper(value, mostLevels))
    return fail('bad-request', { message: `The body is nested more than ${mostLevels} levels deep.` })
  return succeed(value)
}

function nestsDeeper(value: unknown, levels: number): boolean {
  if (typeof value !== 'object' || value === null) return false
  return levels === 0 || Object.values(value).some((inner) => nestsDeeper(inner, levels - 1))
}
