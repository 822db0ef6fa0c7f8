import { describe, expect, it } from 'vitest'
import { guardSignIn } from '@/lib/server/http/guard-sign-in'

const address = 'http://127.0.0.1:3210/api/auth/callback/credentials'
const form = 'application/x-www-form-urlencoded'

/** What the guard answers, and what reached the one behind it. */
async function send(type: string, body: BodyInit, handle?: () => never) {
  let reached: string | undefined
  const request = new Request(address, {
    method: 'POST',
    headers: { 'content-type': type, cookie: 'a=b' },
    body,
    duplex: 'half',
  } as RequestInit)
  const response = await guardSignIn(request, async (guarded) => {
    handle?.()
    reached = `${guarded.headers.get('cookie')} ${await guarded.text()}`
    return new Response('through')
  })
  return { status: response.status, reached, says: await response.text() }
}

describe('what stands before signing in', () => {
  it('hands a form and a JSON object on as they are', async () => {
    expect((await send(form, 'email=a%40b.example&password=x')).reached).toBe(
      'a=b email=a%40b.example&password=x',
    )
    expect((await send('application/json', '{"json":"true"}')).reached).toBe('a=b {"json":"true"}')
  })

  it.each([
    ['application/json', 'xxxx'],
    ['application/json', '[]'],
    ['text/plain', 'email=a'],
  ])('refuses %s that reads %s with a sentence', async (type, body) => {
    const { status, reached, says } = await send(type, body)
    expect([status, reached]).toEqual([400, undefined])
    expect(JSON.parse(says).error.message).toBe('The body is neither a form nor a JSON object.')
  })

  it('stops reading at the byte that is too many', async () => {
    let sent = 0
    const endless = new ReadableStream({
      pull(controller) {
        sent += 4096
        controller.enqueue(new Uint8Array(4096).fill(120))
      },
    })
    const { status, reached } = await send(form, endless)
    expect([status, reached]).toEqual([413, undefined])
    expect(sent).toBeLessThan(100_000)
  })

  it('says that the database is away, as every route does', async () => {
    const away = () => {
      throw Object.assign(new Error('refused'), { code: 'ECONNREFUSED' })
    }
    const { status, says } = await send(form, 'a=b', away as () => never)
    expect([status, JSON.parse(says).error.code]).toEqual([503, 'database-away'])
  })
})
