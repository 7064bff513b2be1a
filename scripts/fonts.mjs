import { copyFileSync, existsSync, mkdirSync, statSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'

/**
 * Copies the three woff2 files of the design (latin subsets, OFL-1.1) and their licences from their
 * packages to public/fonts, from where they are served and precached.
 */
const root = join(dirname(fileURLToPath(import.meta.url)), '..')
const from = join(root, 'node_modules', '@fontsource-variable')
const to = join(root, 'public', 'fonts')

const FONTS = [
  { pkg: 'big-shoulders', file: 'big-shoulders-latin-wght-normal.woff2' },
  {
    pkg: 'atkinson-hyperlegible-next',
    file: 'atkinson-hyperlegible-next-latin-wght-normal.woff2',
  },
  { pkg: 'martian-mono', file: 'martian-mono-latin-wdth-normal.woff2' },
]

mkdirSync(to, { recursive: true })
let bytes = 0
for (const { pkg, file } of FONTS) {
  const source = join(from, pkg, 'files', file)
  if (!existsSync(source)) {
    throw new Error(`${source} is missing: run npm ci`)
  }
  copyFileSync(source, join(to, file))
  copyFileSync(join(from, pkg, 'LICENSE'), join(to, `${pkg}.LICENSE.txt`))
  bytes += statSync(source).size
}
console.log(`fonts: ${FONTS.length} files, ${Math.round(bytes / 1024)} kB`)
