import { createTransport } from 'nodemailer'
import { env } from '@/lib/env'

/** One letter in plain text. `to` has at least one address; `id` makes a resend recognisable. */
export type Letter = { id: string; to: readonly string[]; subject: string; text: string }

/** Sends mail. Rejects when the mail server did not take the letter; then it may be tried again. */
export type Mail = { send(letter: Letter): Promise<void> }

const TIMEOUT_MS = 15_000

/**
 * Mail by SMTP to `url`. Each address is its own recipient of one letter. The Message-ID comes from the
 * letter's id, so a letter taken twice after a lost answer is one letter to the reader's program.
 */
export function smtpMail(url: string, from: string): Mail {
  const transport = createTransport({
    url,
    connectionTimeout: TIMEOUT_MS,
    greetingTimeout: TIMEOUT_MS,
    socketTimeout: TIMEOUT_MS,
  })
  const domain = /@([^>\s]+)/.exec(from)?.[1] ?? 'localhost'
  return {
    async send({ id, to, subject, text }) {
      await transport.sendMail({
        from,
        to: [...to],
        subject,
        text,
        messageId: `<${id}@${domain}>`,
        disableFileAccess: true,
        disableUrlAccess: true,
      })
    },
  }
}

let known: Mail | null = null

/** The mail server of the settings (MAIL_URL, MAIL_FROM). */
export function shopMail(): Mail {
  known ??= smtpMail(env().MAIL_URL, env().MAIL_FROM)
  return known
}
