/**
 * Where a person is in the field app, read from the address. Pure, so that the same table serves the
 * header, the tabs, Back and the screens.
 */
export type JobTab = 'job' | 'checks' | 'log' | 'parts'

/** Screens that change one thing of a job. */
export type SettingName = 'setPlace' | 'setAir' | 'setComplaint' | 'setMachine'

/** Entries that a person writes of their own accord. */
export type NewEntryName = 'note' | 'symptom' | 'photo' | 'voice'

export type Route =
  | { name: 'jobs' | 'new' | 'unsent' | 'about' | 'unknown' }
  | { name: JobTab; jobId: string }
  | {
      name: 'codes' | 'sheet' | 'fix' | 'proof' | 'wayOut' | 'askPart' | NewEntryName | SettingName
      jobId: string
    }
  | { name: 'check' | 'reading'; jobId: string; checkId: string }
  | { name: 'swap'; jobId: string; swapId: string }
  | { name: 'entry' | 'correct'; jobId: string; entryId: string }

const TOP = { '': 'jobs', new: 'new', unsent: 'unsent', about: 'about' } as const
const OF_JOB = {
  '': 'job',
  checks: 'checks',
  log: 'log',
  parts: 'parts',
  codes: 'codes',
  sheet: 'sheet',
  fix: 'fix',
  proof: 'proof',
  wayout: 'wayOut',
  note: 'note',
  symptom: 'symptom',
  photo: 'photo',
  voice: 'voice',
  'parts/ask': 'askPart',
  place: 'setPlace',
  air: 'setAir',
  complaint: 'setComplaint',
  machine: 'setMachine',
} as const

const own = <T extends object>(table: T, key: string): T[keyof T] | null =>
  Object.hasOwn(table, key) ? table[key as keyof T] : null

/** The route of the segments after `/field`. */
export function routeOf(path: readonly string[]): Route {
  const [first = '', jobId] = path
  if (first !== 'jobs') {
    return { name: (path.length < 2 ? own(TOP, first) : null) ?? 'unknown' }
  }
  if (jobId === undefined) {
    return { name: 'jobs' }
  }
  const rest = path.slice(2)
  const name = own(OF_JOB, rest.join('/'))
  return name === null ? withId(jobId, rest) : { name, jobId }
}

function withId(jobId: string, [area, id, more]: readonly string[]): Route {
  if (id === undefined) {
    return { name: 'unknown' }
  }
  if (area === 'checks') {
    if (more === undefined) {
      return { name: 'check', jobId, checkId: id }
    }
    return more === 'reading' ? { name: 'reading', jobId, checkId: id } : { name: 'unknown' }
  }
  if (area === 'swap' && more === undefined) {
    return { name: 'swap', jobId, swapId: id }
  }
  if (area === 'log') {
    if (more === undefined) {
      return { name: 'entry', jobId, entryId: id }
    }
    return more === 'correct' ? { name: 'correct', jobId, entryId: id } : { name: 'unknown' }
  }
  return { name: 'unknown' }
}

/** The address of a job, or of a screen inside it, e.g. `jobHref(id, 'log')`. */
export const jobHref = (jobId: string, screen = ''): string =>
  `/field/jobs/${jobId}${screen === '' ? '' : `/${screen}`}`

/** Where Back goes from a task screen, and what it is called; null on tabs and at the top. */
export function backOf(route: Route): { href: string; label: string } | null {
  switch (route.name) {
    case 'jobs':
    case 'job':
    case 'checks':
    case 'log':
    case 'parts':
      return null
    case 'new':
    case 'unsent':
    case 'about':
    case 'unknown':
      return { href: '/field', label: 'jobs' }
    case 'check':
    case 'swap':
      return { href: jobHref(route.jobId, 'checks'), label: 'checks' }
    case 'reading':
      return { href: jobHref(route.jobId, `checks/${route.checkId}`), label: 'the check' }
    case 'note':
    case 'photo':
    case 'voice':
    case 'entry':
      return { href: jobHref(route.jobId, 'log'), label: 'log' }
    case 'correct':
      return { href: jobHref(route.jobId, `log/${route.entryId}`), label: 'the entry' }
    case 'askPart':
      return { href: jobHref(route.jobId, 'parts'), label: 'parts' }
    case 'codes':
    case 'symptom':
    case 'sheet':
    case 'fix':
    case 'proof':
    case 'wayOut':
    case 'setPlace':
    case 'setAir':
    case 'setComplaint':
    case 'setMachine':
      return { href: jobHref(route.jobId), label: 'job' }
  }
}

/** Screens with something half written: a newer version of the app is not offered over them. */
const FORMS: ReadonlySet<Route['name']> = new Set([
  'new',
  'codes',
  'fix',
  'proof',
  'wayOut',
  'note',
  'symptom',
  'photo',
  'voice',
  'askPart',
  'setPlace',
  'setAir',
  'setComplaint',
  'setMachine',
  'reading',
  'swap',
  'check',
  'correct',
])

/** True while the screen of this route may hold something half written. */
export const isForm = (route: Route): boolean => FORMS.has(route.name)
