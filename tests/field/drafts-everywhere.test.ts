import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, test } from 'vitest'

/** Words to look something up with: nothing of them is recorded. */
const LOOKED_UP = ['components/field/intake/machine-step.tsx', 'components/field/symptom-pick.tsx']

const FOLDERS = ['field', 'checks', 'outcome', 'parts'].map((name) => `components/${name}`)

function sources(folder: string): string[] {
  return readdirSync(folder, { recursive: true, encoding: 'utf8' })
    .filter((name) => /\.tsx?$/.test(name))
    .map((name) => join(folder, name))
}

/** Names of text that lives in the memory of the page alone. */
const inMemory = (text: string): string[] =>
  [...text.matchAll(/const \[(\w+), \w+\] = useState(?:<string(?: \| null)?>)?\(([^)]*)\)/g)]
    .filter(
      ([, , first]) => first !== 'null' && first !== undefined && !/^(false|true|\d)/.test(first),
    )
    .map(([, name]) => name ?? '')

describe('[R8] drafts to the keystroke', () => {
  test('what people type for a record lies in a draft, in every screen of the field', () => {
    const found = FOLDERS.flatMap(sources).flatMap((path) => {
      const text = readFileSync(path, 'utf8')
      const typed = inMemory(text).filter((name) => new RegExp(`value=\\{${name}\\}`).test(text))
      return typed.length > 0 && !LOOKED_UP.includes(path) ? [`${path}: ${typed.join(', ')}`] : []
    })
    expect(found).toEqual([])
  })

  test('the look above finds text that is kept in memory alone', () => {
    expect(inMemory("const [why, setWhy] = useState('')")).toEqual(['why'])
    expect(inMemory("const [time, setTime] = useState(choice.leaveBy ?? '')")).toEqual(['time'])
    expect(inMemory('const [open, setOpen] = useState(false)')).toEqual([])
  })
})
