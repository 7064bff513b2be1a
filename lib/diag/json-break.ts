/**
 * Where a text stops being JSON (RFC 8259), for a sentence that names the field: JSON.parse says it by a count of
 * letters or not at all. Only asked once JSON.parse has refused; without recursion, so that depth does no harm.
 */

/** Line and column from 1, the field's path ('' at the top), and the word that cannot stand there; null at the end. */
export type JsonBreak = { line: number; column: number; field: string; word: string | null }

type Level = { isList: boolean; key: string; index: number }
type Wanted = 'value' | 'valueOrEnd' | 'key' | 'keyOrEnd' | 'colon' | 'commaOrEnd'
type Token = { text: string; kind: 'string' | 'scalar' | 'mark' }
type Walk = { levels: Level[]; wanted: Wanted }

const BLANK = /[ \t\n\r]*/y
const STRING = /"(?:[ !#-[\]-\u{10ffff}]|\\(?:["\\/bfnrt]|u[0-9a-fA-F]{4}))*"/uy
const SCALAR = /(?:-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?|true|false|null)(?![\w.])/y
const MARK = /[{}[\],:]/y
/** What stands where no token does, as far as a sentence can bear it. */
const WORD = /[^\s,\]}]{1,20}|./suy

/** The first place at which a text is no JSON; null when it is. */
export function jsonBreak(text: string): JsonBreak | null {
  const walk: Walk = { levels: [], wanted: 'value' }
  let at = 0
  let isWhole = false
  for (;;) {
    at += found(BLANK, text, at)?.length ?? 0
    if (at >= text.length) return isWhole ? null : placeOf(text, at, walk, null)
    const token = tokenAt(text, at)
    if (token === null || isWhole || !takes(walk, token))
      return placeOf(text, at, walk, found(WORD, text, at))
    at += token.text.length
    isWhole = walk.levels.length === 0
  }
}

function tokenAt(text: string, at: number): Token | null {
  for (const [kind, pattern] of [
    ['string', STRING],
    ['scalar', SCALAR],
    ['mark', MARK],
  ] as const) {
    const got = found(pattern, text, at)
    if (got !== null) return { text: got, kind }
  }
  return null
}

function found(pattern: RegExp, text: string, at: number): string | null {
  pattern.lastIndex = at
  return pattern.exec(text)?.[0] ?? null
}

/** Goes one token on; false when it cannot stand here. */
const takes = (walk: Walk, token: Token): boolean => STEPS[walk.wanted](walk, token)

const STEPS: Record<Wanted, (walk: Walk, token: Token) => boolean> = {
  value: takesValue,
  valueOrEnd: (walk, token) => (token.text === ']' ? closes(walk) : takesValue(walk, token)),
  key: takesKey,
  keyOrEnd: (walk, token) => (token.text === '}' ? closes(walk) : takesKey(walk, token)),
  colon: (walk, { text }) => {
    walk.wanted = 'value'
    return text === ':'
  },
  commaOrEnd: (walk, { text }) => {
    const level = walk.levels.at(-1)
    if (text === (level?.isList ? ']' : '}')) return closes(walk)
    if (level !== undefined) level.index++
    walk.wanted = level?.isList ? 'value' : 'key'
    return text === ','
  },
}

function takesValue(walk: Walk, { text, kind }: Token): boolean {
  if (text === '{' || text === '[') {
    walk.levels.push({ isList: text === '[', key: '', index: 0 })
    walk.wanted = text === '[' ? 'valueOrEnd' : 'keyOrEnd'
    return true
  }
  walk.wanted = 'commaOrEnd'
  return kind !== 'mark'
}

function takesKey(walk: Walk, { text, kind }: Token): boolean {
  const level = walk.levels.at(-1)
  if (kind !== 'string' || level === undefined) return false
  level.key = JSON.parse(text)
  walk.wanted = 'colon'
  return true
}

function closes(walk: Walk): true {
  walk.levels.pop()
  walk.wanted = 'commaOrEnd'
  return true
}

function placeOf(text: string, at: number, { levels }: Walk, word: string | null): JsonBreak {
  const before = text.slice(0, at).split('\n')
  const path = levels.map(({ isList, key, index }) => (isList ? String(index) : key))
  const field = path.filter((step) => step !== '').join('.')
  return { line: before.length, column: (before.at(-1)?.length ?? 0) + 1, field, word }
}
