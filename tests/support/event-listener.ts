import { GET } from '@/app/api/events/route'

type Event = { id: number; event: string; data: string }
/** One `change` event's data. */
export type Change = { seq: number; entity: string; id: string; jobId: string | null }

/** Reads an event stream as a browser does: events as they end, and the last id for coming back. */
export class EventListener {
  readonly events: Event[] = []
  lastId: string | null = null
  ended = false
  readonly #abort = new AbortController()
  #waiting: (() => void)[] = []

  static async open(how: { cookie: string; lastEventId?: string | null }): Promise<EventListener> {
    const listener = new EventListener()
    const headers: Record<string, string> = { cookie: how.cookie }
    if (how.lastEventId) headers['last-event-id'] = how.lastEventId
    const answer = await GET(
      new Request('http://shop.invalid/api/events', { headers, signal: listener.#abort.signal }),
    )
    if (answer.status !== 200) throw new Error(String(answer.status))
    listener.read(answer)
    return listener
  }

  read(answer: Response): void {
    void this.#read(answer).catch(() => undefined)
  }

  async #read(answer: Response): Promise<void> {
    const decoder = new TextDecoder()
    let text = ''
    for await (const chunk of answer.body as unknown as AsyncIterable<Uint8Array>) {
      text += decoder.decode(chunk, { stream: true })
      const frames = text.split('\n\n')
      text = frames.pop() ?? ''
      for (const frame of frames) this.#take(frame)
    }
    this.ended = true
    this.#wake()
  }

  #take(frame: string): void {
    const fields = new Map(
      frame
        .split('\n')
        .map((line) => [line.slice(0, line.indexOf(':')), line.slice(line.indexOf(':') + 2)]),
    )
    this.lastId = fields.get('id') ?? this.lastId
    this.events.push({
      id: Number(fields.get('id')),
      event: fields.get('event') ?? '',
      data: fields.get('data') ?? '',
    })
    this.#wake()
  }

  #wake(): void {
    for (const wake of this.#waiting.splice(0)) wake()
  }

  get changes(): Change[] {
    return this.events
      .filter((event) => event.event === 'change')
      .map((event) => JSON.parse(event.data) as Change)
  }

  /** Waits until it is so; the test's own time-out ends a wait in vain. */
  async until(isSo: () => boolean): Promise<void> {
    while (!isSo()) await new Promise<void>((wake) => this.#waiting.push(wake))
  }

  close(): void {
    this.#abort.abort()
  }
}
