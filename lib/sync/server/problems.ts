/**
 * Every refusal of the routes in one table (RFC 9457): the status, and one plain sentence that says what
 * to do. The phone reads `kind` and the status alone. None of them ever makes a phone drop what it keeps.
 */
const TABLE = {
  badRequest: [400, 'The request could not be read.'],
  badGzip: [400, 'The body is not whole: it could not be unpacked. Send it again.'],
  badJson: [400, 'The body is not what this address takes.'],
  wrongHash: [422, 'The bytes do not match their SHA-256. Send the picture again.'],
  wrongPicture: [422, 'This is not a JPEG, PNG or WebP picture of the kind it says.'],
  hasPosition: [422, 'The file still holds a position. Take it out before sending.'],
  tooManyPixels: [422, 'The picture has more pixels than this shop opens.'],
  wrongVoice: [422, 'This is not a voice note of the kind and length it says.'],
  wrongChunk: [460, 'The chunk does not match its check sum. Send it again.'],
  wrongOffset: [409, 'The upload stands elsewhere. Ask where, and go on from there.'],
  notBegun: [404, 'No such upload is under way. Begin it again.'],
  gone: [410, 'The upload was given up after a long time. Begin it again.'],
  wrongVersion: [412, 'This address speaks tus 1.0.0.'],
  badKey: [422, 'A device needs a P-256 public key as a JSON Web Key.'],
  signIn: [401, 'Sign in first.'],
  badSignature: [401, 'The signature does not fit the body. Keep the work and send it again.'],
  unknownDevice: [
    401,
    'The shop does not know this device. Keep the work, sign in and enrol the device again.',
  ],
  deviceRevoked: [403, 'This device was revoked by the shop. Nothing was deleted; ask the owner.'],
  noMembership: [
    403,
    'This person is not a member of the shop any more. Nothing was taken and nothing was deleted.',
  ],
  forbidden: [403, 'Your roles in this shop do not allow this.'],
  notFound: [404, 'There is nothing here for you under this address.'],
  methodNotAllowed: [405, 'This address does not take that method.'],
  notAsItStands: [409, 'It does not stand as that asks. Look again, then choose.'],
  entryFirst: [409, 'The log entry that names this picture has not arrived yet. Send it first.'],
  notOurFile: [422, 'This is no file of unsent work. Nothing was taken.'],
  olderFile: [
    422,
    'The file is of an older version and not signed. Have the phone make a new one.',
  ],
  changedFile: [422, 'The file was changed after the phone made it. Nothing was taken.'],
  otherShop: [422, 'The file is of another shop. Nothing was taken.'],
  unknownPhone: [422, 'The shop does not know the phone that made this file. Nothing was taken.'],
  personLeft: [422, 'The person whose work this is left the shop. Nothing was taken.'],
  decidedBefore: [409, 'That was decided before, and the word stands. Read the list again.'],
  tooLarge: [413, 'Too much at once. Send it in smaller parts.'],
  tooOld: [426, 'The work is kept. Update the app, then it can be sent.'],
  tooMany: [429, 'Too many requests. Wait a little and go on.'],
  busy: [503, 'The shop’s server is busy. Try again shortly.'],
  tooNew: [503, 'The shop’s server is older than the app. The work is kept; try again later.'],
} as const satisfies Record<string, readonly [number, string]>

export type HttpProblem = { kind: keyof typeof TABLE; retryAfterSeconds?: number; allow?: string }

/** Turns a problem into its answer: `application/problem+json`, never cached. */
export function problemAnswer(problem: HttpProblem): Response {
  const [status, title] = TABLE[problem.kind]
  const headers = new Headers({
    'content-type': 'application/problem+json',
    'cache-control': 'no-store',
  })
  if (problem.retryAfterSeconds !== undefined) {
    headers.set('retry-after', String(problem.retryAfterSeconds))
  }
  if (problem.allow !== undefined) headers.set('allow', problem.allow)
  const body = { type: `urn:farbench:problem:${problem.kind}`, kind: problem.kind, title, status }
  return new Response(JSON.stringify(body), { status, headers })
}

/** Handlers for the methods a route does not take; it exports those it has not. */
export function refusing(allow: string) {
  const refuse = () => problemAnswer({ kind: 'methodNotAllowed', allow })
  return { GET: refuse, POST: refuse, PUT: refuse, PATCH: refuse, DELETE: refuse }
}
