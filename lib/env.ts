import * as z from 'zod/mini'

/**
 * The only reader of server settings, with lib/env-public.ts for the browser's. Parsed once, at the
 * first use; a missing setting stops the start with its name (a build needs none of them).
 */
const settings = z.object({
  /** PostgreSQL as role farbench_app: bound by row-level security. */
  DATABASE_URL: z.string().check(z.minLength(1)),
  NEXTAUTH_SECRET: z.string().check(z.minLength(32)),
  NEXTAUTH_URL: z.url(),
  /** SMTP address of the mail server, e.g. smtp://127.0.0.1:2525. */
  MAIL_URL: z.string().check(z.minLength(1)),
  MAIL_FROM: z._default(z.string(), 'Farbench <farbench@demo.invalid>'),
  /** S3-compatible store in which verified photos and voice notes are kept, path style. */
  FILES_URL: z.url(),
  FILES_BUCKET: z._default(z.string().check(z.minLength(1)), 'farbench'),
  FILES_REGION: z._default(z.string().check(z.minLength(1)), 'us-east-1'),
  FILES_KEY: z.string().check(z.minLength(1)),
  FILES_SECRET: z.string().check(z.minLength(1)),
  /** Durable folder for what is still coming in; with several servers, one that they share. */
  FILES_STAGE: z.string().check(z.minLength(1)),
})
export type Env = z.infer<typeof settings>

let parsed: Env | null = null

/** Answers the settings; throws with the names of what is missing or wrong. */
export function env(): Env {
  if (parsed) return parsed
  const answer = settings.safeParse(process.env)
  if (!answer.success) {
    const names = [...new Set(answer.error.issues.map((issue) => issue.path.join('.')))]
    throw new Error(
      `Settings missing or wrong: ${names.join(', ')}. npm start writes them to .env.local.`,
    )
  }
  parsed = answer.data
  return parsed
}
