// The line between the shop's program and PostgreSQL, which a test may cut at the commit of a push.
import { type AddressInfo, connect, createServer, type Socket } from 'node:net'

/** `before`: the commit never arrives. `after`: it is done, and its answer is lost. */
export type CommitCut = 'before' | 'after'

export type DatabaseLine = {
  /** The address to connect to instead of the given one. */
  url: string
  /** Cuts the next transaction that stores ops; resolves once it is cut. */
  cutCommit(how: CommitCut): Promise<void>
  close(): Promise<void>
}

/** Passes everything on to the database at `url` (TCP, without TLS). */
export async function openDatabaseLine(url: string): Promise<DatabaseLine> {
  const target = new URL(url)
  const sockets = new Set<Socket>()
  let armed: { how: CommitCut; done: () => void } | null = null

  /** One connection of the program: what it sends is looked at, what comes back is passed on. */
  function pass(program: Socket) {
    const database = connect(Number(target.port), target.hostname)
    let stores = false
    let cutting = false
    const end = () => {
      program.destroy()
      database.destroy()
      sockets.delete(program)
    }
    program.on('data', (piece) => {
      stores ||= armed !== null && /save_ops|take_evidence/.test(piece.toString('latin1'))
      const isCommit = stores && armed !== null && piece.includes('commit')
      if (isCommit && armed?.how === 'before') {
        armed.done()
        armed = null
        end()
        return
      }
      cutting = isCommit
      database.write(piece)
    })
    database.on('data', (piece) => {
      if (!cutting) {
        program.write(piece)
        return
      }
      armed?.done()
      armed = null
      end()
    })
    for (const socket of [program, database]) socket.on('error', end).on('close', end)
    sockets.add(program)
  }

  const server = createServer(pass)
  await new Promise<void>((done) => server.listen(0, '127.0.0.1', done))
  const through = new URL(url)
  through.hostname = '127.0.0.1'
  through.port = String((server.address() as AddressInfo).port)
  return {
    url: through.href,
    cutCommit: (how) =>
      new Promise((done) => {
        armed = { how, done }
      }),
    close: async () => {
      for (const socket of sockets) socket.destroy()
      await new Promise<void>((done) => server.close(() => done()))
    },
  }
}
