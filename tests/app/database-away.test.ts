import net from 'node:net'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Tables } from '@/db/tables/database'
import { database as pool } from '@/lib/server/database'
import { errors } from '@/lib/shared/errors'
import { withDatabase } from '../support/database'
import { call } from './support/call'
import { exampleCircuit } from './support/example'
import { makeShop, type Shop } from './support/shop'

/** Stands between the application and the database, and can be cut. */
class Wire {
  private readonly sockets = new Set<net.Socket>()
  private server: net.Server | undefined
  port = 0
  /** Cuts the connection as soon as a statement contains this. */
  cutAt: string | null = null

  constructor(private readonly target: number) {}

  async join(): Promise<void> {
    const server = net.createServer((client) => {
      const far = net.connect(this.target, '127.0.0.1')
      for (const socket of [client, far]) {
        this.sockets.add(socket)
        socket.on('error', () => {})
        socket.on('close', () => {
          client.destroy()
          far.destroy()
        })
      }
      client.on('data', (data) => {
        if (this.cutAt !== null && data.includes(this.cutAt)) client.destroy()
        else far.write(data)
      })
      far.on('data', (data) => void client.write(data))
    })
    this.server = server
    await new Promise<void>((done) => server.listen(this.port, '127.0.0.1', done))
    this.port = (server.address() as net.AddressInfo).port
  }

  async cut(): Promise<void> {
    for (const socket of this.sockets) socket.destroy()
    this.sockets.clear()
    await new Promise<void>((done) => (this.server ? this.server.close(() => done()) : done()))
  }
}

describe('the database going away', () => {
  const database = withDatabase<Tables>()
  let wire: Wire
  let shop: Shop

  beforeAll(async () => {
    const url = new URL(database.appUrl)
    wire = new Wire(Number(url.port))
    await wire.join()
    url.port = String(wire.port)
    shop = await makeShop(database, 'Alder Lane', { appUrl: url.href })
  })
  afterAll(async () => {
    await pool().destroy()
    await wire.cut()
  })

  const add = (title: string) =>
    call(shop.people.owner, 'POST', 'circuits', { document: exampleCircuit((c) => void (c.title = title)) })

  it('is answered with 503 and a plain sentence, and work goes on once it is back', async () => {
    expect((await add('Before')).status).toBe(201)
    await wire.cut()
    for (const answer of [await add('Meanwhile'), await call(shop.people.owner, 'GET', 'circuits')]) {
      expect(answer.status).toBe(503)
      expect(answer.body.error).toEqual({
        code: 'database-away',
        message: errors['database-away'].sentence,
      })
    }
    await wire.join()
    const rows = (await call(shop.people.owner, 'GET', 'circuits')).body.rows
    expect(rows.map((row: { title: string }) => row.title)).toEqual(['Before'])
  })

  it('in the middle of a save leaves nothing of it', async () => {
    wire.cutAt = 'insert into "circuit_wires"'
    const broken = await add('Half')
    wire.cutAt = null
    expect([broken.status, broken.body.error.code]).toEqual([503, 'database-away'])
    const rows = (await call(shop.people.owner, 'GET', 'circuits')).body.rows
    expect(rows.map((row: { title: string }) => row.title)).toEqual(['Before'])
    expect((await add('Half')).status).toBe(201)
  })
})
