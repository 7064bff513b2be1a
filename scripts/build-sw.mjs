// After `next build`: bundles app/sw.ts to public/sw.js with its precache list.
//
// The list holds what the /field and /~offline documents reach and nothing of the desk: every build file
// they name, and every build file those name, until nothing new is named. Turbopack writes the path of a
// chunk that is loaded later (or by a worker) as plain text into the chunk that loads it.
import { createHash } from 'node:crypto'
import { existsSync, readFileSync, statSync } from 'node:fs'
import { join } from 'node:path'
import { gzipSync } from 'node:zlib'
import { getManifest } from '@serwist/build'
import { build } from 'esbuild'

const root = process.cwd()
const next = join(root, '.next')
const DOCUMENTS = ['field', '~offline']
/** Most bytes, raw, that a phone is asked to keep (a choice, written in docs/decisions). */
const MOST_BYTES = 3_000_000

const documents = DOCUMENTS.map(prerendered)
const files = reachable(documents.map((document) => document.html))
const { manifestEntries: publicEntries } = await getManifest({
  globDirectory: 'public',
  globPatterns: [
    'fonts/*.woff2',
    'icons/*.{svg,png}',
    'manifest.webmanifest',
    'theme.js',
    'favicon.ico',
  ],
  maximumFileSizeToCacheInBytes: 1_000_000,
})

const entries = [
  ...documents.map(({ path, html }) => ({
    url: path,
    revision: createHash('md5').update(html).digest('hex'),
  })),
  // Their names carry their hash.
  ...files.map((file) => ({ url: `/_next/${file}`, revision: null })),
  ...(publicEntries ?? []).map((entry) => ({ ...entry, url: `/${entry.url}` })),
]

await build({
  entryPoints: ['app/sw.ts'],
  outfile: 'public/sw.js',
  bundle: true,
  minify: true,
  format: 'iife',
  platform: 'browser',
  target: ['chrome111', 'safari16.4', 'firefox111'],
  alias: { '@': root },
  define: {
    'self.__SW_MANIFEST': JSON.stringify(entries),
    'process.env.NODE_ENV': '"production"',
  },
})

report()

/** A document that the build made once and for all; anything else cannot be kept on a phone. */
function prerendered(name) {
  const path = `/${name}`
  const file = join(next, 'server', 'app', `${name}.html`)
  const manifest = JSON.parse(readFileSync(join(next, 'prerender-manifest.json'), 'utf8'))
  const route = manifest.routes[path]
  if (!existsSync(file) || route === undefined || route.initialRevalidateSeconds !== false) {
    throw new Error(`${path} is not a static document: it cannot open without signal`)
  }
  return { path, html: readFileSync(file, 'utf8') }
}

/** Build files named in these texts, and in those files, and so on; as paths under .next. */
function reachable(texts) {
  const found = new Set()
  const queue = [...texts]
  for (let text = queue.pop(); text !== undefined; text = queue.pop()) {
    for (const [file] of text.matchAll(/static\/[\w~./@%()[\]-]+\.(?:js|css|woff2)/g)) {
      if (found.has(file) || !existsSync(join(next, file))) continue
      found.add(file)
      if (!file.endsWith('.woff2')) queue.push(readFileSync(join(next, file), 'utf8'))
    }
  }
  return [...found].sort()
}

function report() {
  const sizeOf = (file) => statSync(file).size
  const built = files.map((file) => sizeOf(join(next, file)))
  const fixed = (publicEntries ?? []).map((entry) =>
    sizeOf(join(root, 'public', entry.url.slice(0))),
  )
  const html = documents.map(({ html: text }) => Buffer.byteLength(text))
  const bytes = [...built, ...fixed, ...html].reduce((sum, size) => sum + size, 0)
  const worker = readFileSync(join(root, 'public', 'sw.js'))
  const kib = (size) => `${(size / 1024).toFixed(0)} KiB`
  console.log(
    `service worker: ${entries.length} files to keep, ${kib(bytes)} raw; sw.js ${kib(gzipSync(worker).length)} gzip`,
  )
  if (bytes > MOST_BYTES) throw new Error(`more than ${kib(MOST_BYTES)} to keep on a phone`)
}
