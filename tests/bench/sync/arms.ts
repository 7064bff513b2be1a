// Builds the page once and opens a gateway for each arm.
import { existsSync } from 'node:fs'
import { join } from 'node:path'
import { build } from 'esbuild'
import { type Gateway, openGateway } from './gateway'

const root = process.cwd()
const PEERS = join(root, 'tests', 'bench', 'peers')

async function bundle(entry: string): Promise<string> {
  const made = await build({
    entryPoints: [entry],
    bundle: true,
    minify: true,
    write: false,
    format: 'iife',
    platform: 'browser',
    target: ['chrome120'],
    alias: { '@': root },
    // The peers' packages ask for these as Node has them.
    define: { 'process.env.NODE_ENV': '"production"', global: 'globalThis' },
    logLevel: 'error',
  })
  return made.outputFiles[0]?.text ?? ''
}

/** The same page for every arm; each has an origin of its own, so that no store sees another's. */
export async function openArms(
  targets: Record<string, string>,
): Promise<{ gateways: Record<string, Gateway>; close(): Promise<void> }> {
  const scripts: Record<string, string> = {
    'ours.js': await bundle(join('tests', 'bench', 'sync', 'page', 'page.ts')),
  }
  const withPeers = 'pouchdb' in targets && existsSync(join(PEERS, 'node_modules'))
  if (withPeers) scripts['peers.js'] = await bundle(join(PEERS, 'page.mjs'))
  const tags = Object.keys(scripts).map((name) => `<script src="/bench/${name}"></script>`)
  const page = { html: `<!doctype html><title>bench</title>${tags.join('')}`, scripts }
  const gateways: Record<string, Gateway> = {}
  for (const [name, target] of Object.entries(targets))
    gateways[name] = await openGateway(target, page)
  const close = async () => {
    await Promise.all(Object.values(gateways).map((gateway) => gateway.close()))
  }
  return { gateways, close }
}
