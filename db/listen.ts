// One connection per process that listens for numbered changes (bones.md 4). The payload names shop
// and number only (NOTIFY ends at 8,000 bytes); readers fetch the rows. After a lost connection the
// caller is told to read its shops again, because what was notified meanwhile is gone.
import pg from 'pg'
import { appDbUrl } from './client'

export type ChangeListener = {
  /** Called once per commit that took numbers: the shop's counter stands at `seq`. */
  onChange: (shopId: string, seq: number) => void
  /** Called after each reconnect: read on from the last number seen. */
  onResync: () => void
}

const CHANNEL = 'farbench_change'
const FIRST_WAIT_MS = 100
const LONGEST_WAIT_MS = 5000
const PING_MS = 30_000

/** Starts to listen, reconnects for ever, and answers how to stop. `ready` resolves at the first LISTEN. */
export function listenForChanges(
  listener: ChangeListener,
  url: string = appDbUrl(),
): { ready: Promise<void>; close: () => Promise<void> } {
  let client: pg.Client | null = null
  let timer: NodeJS.Timeout | undefined
  let closed = false
  let waitMs = FIRST_WAIT_MS
  let hadConnection = false
  let ready: () => void = () => undefined
  const firstListen = new Promise<void>((resolve) => {
    ready = resolve
  })

  const lose = (lost: pg.Client) => {
    if (client !== lost) return
    client = null
    clearInterval(timer)
    void lost.end().catch(() => undefined)
    if (closed) return
    timer = setTimeout(() => void connect(), waitMs)
    waitMs = Math.min(waitMs * 2, LONGEST_WAIT_MS)
  }

  const connect = async () => {
    const next = new pg.Client({
      connectionString: url,
      keepAlive: true,
      query_timeout: 10_000,
      connectionTimeoutMillis: 10_000,
    })
    client = next
    next.on('error', () => lose(next))
    next.on('end', () => lose(next))
    next.on('notification', ({ payload }) => tell(listener, payload))
    try {
      await next.connect()
      await next.query(`listen ${CHANNEL}`)
    } catch {
      lose(next)
      return
    }
    if (closed) return
    waitMs = FIRST_WAIT_MS
    // A half-dead line sends no error: a question without an answer shows it.
    timer = setInterval(() => void next.query('select 1').catch(() => lose(next)), PING_MS)
    timer.unref()
    if (hadConnection) listener.onResync()
    hadConnection = true
    ready()
  }

  void connect()
  const close = async () => {
    closed = true
    clearTimeout(timer)
    clearInterval(timer)
    const last = client
    client = null
    await last?.end().catch(() => undefined)
  }
  return { ready: firstListen, close }
}

function tell(listener: ChangeListener, payload: string | undefined): void {
  if (payload === undefined) return
  const { shop, seq } = JSON.parse(payload) as { shop: string; seq: number }
  listener.onChange(shop, seq)
}
