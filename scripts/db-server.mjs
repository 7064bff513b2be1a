// Finds the programs of a PostgreSQL server, and installs them when there are none; see db.mjs.
import { spawnSync } from 'node:child_process'
import { existsSync, readdirSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'

const BASE = '/usr/lib/postgresql'
/** Before this version schema `public` belongs to another role, and the first migration fails. */
const LEAST_MAJOR = 15

/** Folder of the newest server programs, or of version `made` when it is there. */
export function serverFolder(made, { mayInstall }) {
  const versions = existsSync(BASE)
    ? readdirSync(BASE).filter((name) => existsSync(join(BASE, name, 'bin', 'initdb')))
    : []
  const [newest] = versions.sort((a, b) => Number(b) - Number(a))
  if (newest === undefined) {
    if (!mayInstall)
      throw new Error('PostgreSQL server not found: install the package "postgresql"')
    installServer()
    return serverFolder(made, { mayInstall: false })
  }
  if (Number(newest) < LEAST_MAJOR)
    throw new Error(`PostgreSQL ${newest} is too old: install version ${LEAST_MAJOR} or later`)
  return join(BASE, versions.includes(made) ? made : newest, 'bin')
}

/** Installs the package without the cluster that it makes and starts at every boot where there is none yet. */
function installServer() {
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' }
  const options = { env, stdio: ['ignore', 'ignore', 'inherit'] }
  const apt = (...args) => spawnSync('apt-get', args, options).status === 0
  if (!apt('update', '-qq')) throw new Error('apt-get update failed: is there a network?')
  const install = (name) => {
    if (!apt('install', '-y', '-qq', '--no-install-recommends', name))
      throw new Error(`Could not install the package "${name}"`)
  }
  install('postgresql-common')
  const clusters = '/etc/postgresql'
  if (!existsSync(clusters) || readdirSync(clusters).length === 0) {
    const config = '/etc/postgresql-common/createcluster.conf'
    writeFileSync(config, withoutMain(existsSync(config) ? readFileSync(config, 'utf8') : ''))
  }
  install('postgresql')
}

/** The settings of new clusters with the one that the package makes by itself turned off. */
function withoutMain(settings) {
  const kept = settings.split('\n').filter((line) => !/^\s*#?\s*create_main_cluster\b/.test(line))
  return `${kept.join('\n').trimEnd()}\ncreate_main_cluster = false\n`.trimStart()
}
