// After `next build`: writes .next/csp.json, the hashes of the inline scripts of every static document.
import { createHash } from 'node:crypto'
import { readdirSync, readFileSync, writeFileSync } from 'node:fs'
import { join, relative } from 'node:path'

const root = join(process.cwd(), '.next', 'server', 'app')

function* documents(folder) {
  for (const entry of readdirSync(folder, { withFileTypes: true })) {
    const path = join(folder, entry.name)
    if (entry.isDirectory()) yield* documents(path)
    else if (entry.name.endsWith('.html')) yield path
  }
}

const hashes = {}
for (const file of documents(root)) {
  const html = readFileSync(file, 'utf8')
  // The framework's own last page; app/global-error.tsx takes its place as soon as scripts run.
  if (file.endsWith('_global-error.html')) continue
  if (/<[^>]+\sstyle=/.test(html.replace(/<script[\s\S]*?<\/script>/g, '')))
    throw new Error(`${relative(root, file)} has a style attribute, which the policy refuses`)
  const route = `/${relative(root, file).replace(/\.html$/, '')}`.replace(/^\/index$/, '/')
  hashes[route] = [...html.matchAll(/<script(?![^>]*\ssrc=)[^>]*>([\s\S]*?)<\/script>/g)].map(
    (match) => `'sha256-${createHash('sha256').update(match[1]).digest('base64')}'`,
  )
}
writeFileSync(join(process.cwd(), '.next', 'csp.json'), JSON.stringify(hashes, null, 1))
console.log(`policy hashes for ${Object.keys(hashes).length} static documents`)
