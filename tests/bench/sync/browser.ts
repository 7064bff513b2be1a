// B2, B3, B5 and B6: one device sends its records, then a fresh one fetches them, in real Chromium.
import { type Browser, type BrowserContext, chromium, type Page } from '@playwright/test'
import { CHROMIUM, FLAGS } from '../../support/e2e/phone'
import { openArms } from './arms'
import { turnOrder } from './figures'
import type { Crossed, Gateway } from './gateway'
import type { Task } from './page/arm'
import { makeRecords, NOTE_KINDS, type NoteKind } from './records'
import { cookieOf, makeCrew, type Stage, type Worker } from './stage'

/** What one arm did in one turn. */
export type Carried = {
  arm: string
  kind: NoteKind
  turn: number
  push: Crossed & { ms: number }
  pull: Crossed & { ms: number }
}

type Run = { browser: Browser; gateway: Gateway; arm: string; worker: Worker; task: Task }

/** Runs `turns` turns of every arm, in turns; random words only in the first three, for their bytes. */
export async function carryAll(
  stage: Stage,
  of: { turns: number; count: number; peers: Record<string, string>; say(words: string): void },
): Promise<Carried[]> {
  const targets = { product: stage.product.base, floor: stage.floor.base, ...of.peers }
  const { gateways, close } = await openArms(targets)
  const browser = await chromium.launch({ executablePath: CHROMIUM, headless: true, args: FLAGS })
  const carried: Carried[] = []
  try {
    for (let turn = -1; turn < of.turns; turn += 1) {
      const kinds = turn < 3 ? NOTE_KINDS : NOTE_KINDS.slice(0, 1)
      for (const kind of kinds) {
        for (const arm of turnOrder(Object.keys(targets), turn + 1)) {
          const gateway = gateways[arm]!
          const [worker] = (await makeCrew(1)) as [Worker]
          const task = taskOf(worker, { count: of.count, kind, seed: 1000 + turn })
          const one = await carry({ browser, gateway, arm, worker, task })
          // The first turn warms everybody up and is not counted.
          if (turn >= 0) carried.push({ ...one, arm, kind, turn })
        }
      }
      of.say(`browser turn ${turn + 1} of ${of.turns}`)
    }
    return carried
  } finally {
    await browser.close()
    await close()
  }
}

function taskOf(worker: Worker, of: { count: number; kind: NoteKind; seed: number }): Task {
  const { actor, jobId } = worker
  const whose = { jobId, authorId: actor.personId, untilMs: Date.now() - 60_000 }
  return { records: makeRecords({ ...of, ...whose }), count: of.count, actor, jobId }
}

async function carry(run: Run): Promise<Pick<Carried, 'push' | 'pull'>> {
  const push = await onDevice(run, async (page) => {
    await call(page, run, 'fill')
    return await measured(run, () => call(page, run, 'push'))
  })
  const pull = await onDevice(run, async (page) => {
    await call(page, run, 'fresh')
    return await measured(run, () => call(page, run, 'pull'))
  })
  if (pull.result !== run.task.count) throw new Error(`${run.arm}: pulled ${pull.result}`)
  return { push: push.figures, pull: pull.figures }
}

/** A browser profile of its own, signed in. */
async function onDevice<T>(run: Run, work: (page: Page) => Promise<T>): Promise<T> {
  const context: BrowserContext = await run.browser.newContext({ baseURL: run.gateway.base })
  try {
    const cookie = await cookieOf(run.worker)
    await context.addCookies([{ ...cookie, url: run.gateway.base }])
    const page = await context.newPage()
    page.on('pageerror', (error) => console.error(`${run.arm}: ${error.message}`))
    await page.goto('/bench/')
    return await work(page)
  } finally {
    await context.close()
  }
}

type Step = 'fill' | 'push' | 'fresh' | 'pull'
type Called = { ms: number; result: number | undefined }

const call = (page: Page, { arm, task }: Run, step: Step): Promise<Called> =>
  page.evaluate(
    async (of) => {
      const runs = globalThis.benchArms?.[of.arm]
      if (runs === undefined) throw new Error(`no arm ${of.arm}`)
      const began = performance.now()
      const result = await runs[of.step](of.task)
      return { ms: performance.now() - began, result: result ?? undefined }
    },
    { arm, task, step },
  )

async function measured(run: Run, work: () => Promise<Called>) {
  run.gateway.reset()
  const { ms, result } = await work()
  return { figures: { ...run.gateway.crossed(), ms }, result }
}
