'use client'

import './globals.css'

/** The last page: shown when even the frame of the pages fails. Work on the phone is untouched by it. */
export default function GlobalError({ reset }: { reset: () => void }) {
  return (
    <html lang="en-GB">
      <body>
        <main className="grid gap-4 p-4">
          <h1 className="caps text-title">Something broke here</h1>
          <p>Nothing saved on this phone is lost. Try again; if it stays, tell the shop.</p>
          <button type="button" className="key key-main" onClick={reset}>
            Try again
          </button>
        </main>
      </body>
    </html>
  )
}
