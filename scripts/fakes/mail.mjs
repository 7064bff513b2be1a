// A mail server for the demo and the tests: takes every letter on loopback, keeps it as .eml in
// .data/mail and prints one line for it. Nothing leaves the machine. Port: MAIL_PORT, 2525.
import { mkdirSync, renameSync, writeFileSync } from 'node:fs'
import { join, resolve } from 'node:path'
import { fileURLToPath } from 'node:url'
import { SMTPServer } from 'smtp-server'

const root = resolve(fileURLToPath(new URL('../..', import.meta.url)))
const MAX_BYTES = 10 * 1024 * 1024

/** The subject as it stands in the head of a letter, for the list on the screen. */
const subjectOf = (text) =>
  /^subject:[ \t]*(.*(?:\r?\n[ \t].*)*)/im.exec(text)?.[1]?.replace(/\r?\n[ \t]+/g, ' ') ?? ''

/** Starts the server; answers its port and how to stop it. `folder` gets one file per letter. */
export function startMail({ port, folder, heard = () => undefined }) {
  mkdirSync(folder, { recursive: true })
  let count = 0
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['AUTH', 'STARTTLS'],
    disableReverseLookup: true,
    size: MAX_BYTES,
    onData(stream, session, done) {
      const parts = []
      stream.on('data', (part) => parts.push(part))
      stream.on('end', () => {
        if (stream.sizeExceeded) {
          done(Object.assign(new Error('Letter too large'), { responseCode: 552 }))
          return
        }
        const letter = Buffer.concat(parts)
        const to = session.envelope.rcptTo.map((address) => address.address)
        const stamp = new Date().toISOString().replaceAll(':', '')
        const name = `${stamp}-${process.pid}-${String(++count).padStart(4, '0')}.eml`
        // Written beside and moved, so that a reader never sees half a letter.
        writeFileSync(join(folder, `.${name}.part`), letter)
        renameSync(join(folder, `.${name}.part`), join(folder, name))
        heard({ name, to, subject: subjectOf(letter.toString('utf8')) })
        done()
      })
    },
  })
  return new Promise((answer, refuse) => {
    server.once('error', refuse)
    server.listen(port, '127.0.0.1', () => {
      // A client that breaks off in the middle is its own trouble.
      server.off('error', refuse)
      server.on('error', () => undefined)
      answer({
        port: server.server.address().port,
        stop: () => new Promise((stopped) => server.close(stopped)),
      })
    })
  })
}

if (process.argv[1] && resolve(process.argv[1]) === fileURLToPath(import.meta.url)) {
  const mail = await startMail({
    port: Number(process.env.MAIL_PORT ?? 2525),
    folder: process.env.MAIL_DIR ?? join(root, '.data', 'mail'),
    heard: ({ name, to, subject }) => console.log(`mail to ${to.join(', ')}: ${subject} (${name})`),
  })
  console.log(`mail on 127.0.0.1:${mail.port}`)
  for (const signal of ['SIGINT', 'SIGTERM'])
    process.once(signal, async () => {
      await mail.stop()
      process.exit(0)
    })
}
