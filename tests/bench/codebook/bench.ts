// npm run bench:codebook [-- --quick | --symptom ID | --described]: what the code book is worth. Machines are drawn
// from the book's own figures and from figures off by up to two; the plan is driven to the end, beside checks in a
// drawn order and beside repairing the likeliest first; then twelve machines that were described beforehand. Prints,
// and writes docs/performance.md.
import { BOOK_ITEMS } from '@/db/codebook/book'
import { DEMO_MODELS } from '@/db/codebook/demo-models'
import { type BookIndex, indexBook } from '@/lib/diag/book-index'
import { letsThrough } from '@/lib/diag/gate'
import type { CodeBookItem, SymptomItem } from '@/lib/model/code-book'
import { FEATURE_NAMES, type Features } from '@/lib/model/features'
import { randomFrom } from '../diag/models'
import { machineFacts, mean, table, writePart } from '../marked-part'
import { describedTable } from './described-table'
import { byPlan, type Drive, drawnAnswers, drive, mostLikely, type Policy, randomly } from './drive'
import { drawMachine, perturbed } from './machine'
import { aboveOptimum } from './small'

const quick = process.argv.includes('--quick')
const only = process.argv[process.argv.indexOf('--symptom') + 1]
const one = process.argv.includes('--symptom') ? only : undefined
const MACHINES = quick ? 4 : 16
/** Of 100 features of a machine, how many nobody can tell in the perturbed world. */
const UNKNOWN_OF_100 = 20

const open = (items: readonly CodeBookItem[]): BookIndex =>
  indexBook({ version: 1, hash: '', publishedAt: '', items: [...items] })
const index = open(BOOK_ITEMS)
const of100 = (xs: readonly boolean[]) =>
  `${Math.round((100 * xs.filter(Boolean).length) / xs.length)}`

type World = {
  name: string
  truth: (seed: number) => BookIndex
  told: (f: Features, seed: number) => Features
}
const WORLDS: readonly World[] = [
  { name: 'own', truth: () => index, told: (features) => features },
  {
    name: 'off',
    truth: (seed) => open(perturbed(BOOK_ITEMS, randomFrom(seed * 31 + 7))),
    told: (features, seed) => {
      const random = randomFrom(seed * 17 + 3)
      const known = FEATURE_NAMES.filter(() => random() * 100 >= UNKNOWN_OF_100)
      return Object.fromEntries(known.map((name) => [name, features[name]]))
    },
  },
]

type Policies = Record<'plan' | 'random' | 'likeliest', Drive[]>

const modelsFor = (symptom: SymptomItem) =>
  DEMO_MODELS.filter((m) => letsThrough(symptom.gate, m.features))

/** The same machines for each policy; each draws its answers from the same seed. */
function measure(symptom: SymptomItem, world: World): Policies {
  const models = modelsFor(symptom)
  const drives: Policies = { plan: [], random: [], likeliest: [] }
  for (let seed = 1; seed <= MACHINES; seed++) {
    const model = models[seed % models.length]
    if (model === undefined) break
    const truth = world.truth(seed)
    const machine = drawMachine(
      { index: truth, symptom: symptom.id, features: model.features },
      randomFrom(seed * 101),
    )
    const told = world.told(model.features, seed)
    const go = (policy: Policy) =>
      drive({ index, machine, told, policy, answers: drawnAnswers(truth, randomFrom(seed * 13)) })
    drives.plan.push(go(byPlan))
    drives.random.push(go(randomly(randomFrom(seed * 7))))
    drives.likeliest.push(go(mostLikely))
  }
  return drives
}

const brief = (drives: readonly Drive[]): string => {
  const money = mean(drives.map((d) => d.costMinor)) / 100
  return `${of100(drives.map((d) => d.rightAtEnd))} right, ${of100(drives.map((d) => d.fixed))} fixed, ${mean(drives.map((d) => d.checks)).toFixed(1)} checks, ${mean(drives.map((d) => d.minutes)).toFixed(0)} min, ${money.toFixed(0)}`
}

/** What the plan costs above the optimum on the small problem of each machine of the demo shop. */
function aboveCell(symptom: SymptomItem): string {
  const found = modelsFor(symptom).flatMap(
    ({ features }) => aboveOptimum({ index, symptom: symptom.id, features }) ?? [],
  )
  const percent = (x: number) => `${(100 * x).toFixed(2)} %`
  return found.length === 0
    ? '-'
    : `${percent(mean(found))}, worst ${percent(Math.max(...found))}, n ${found.length}`
}

function main(): void {
  if (!process.argv.includes('--described')) drawn(machineFacts())
  if (quick || one !== undefined) return
  const facts = ['Command: `npm run bench:codebook -- --described`', ...machineFacts()]
  const body = describedTable(index, console.log)
  console.log(body)
  writePart({ name: 'bench:codebook -- --described', facts, body })
}

function drawn(facts: readonly string[]): void {
  const symptoms = [...index.symptoms.values()].filter(
    (s) => s.opens === 'suspects' && (one === undefined || s.id === one),
  )
  const rows = symptoms.flatMap((symptom) => {
    const above = aboveCell(symptom)
    return WORLDS.map((world) => {
      const { plan, random, likeliest } = measure(symptom, world)
      const cells = [
        symptom.name,
        world.name,
        mean(plan.map((d) => d.openAfterLook)).toFixed(1),
        brief(plan),
        brief(random),
        brief(likeliest),
        above,
      ]
      console.log(cells.join(' | '))
      return cells
    })
  })
  const body = table(
    [
      'complaint',
      'figures',
      'suspects open after the first look',
      'by the plan',
      'checks in a drawn order',
      'likeliest first',
      'six suspects, eight checks: above the optimum',
    ],
    rows,
  )
  if (!quick && one === undefined)
    writePart({
      name: 'bench:codebook',
      facts: ['Command: `npm run bench:codebook`', ...facts],
      body,
    })
}

main()
