/** Next.js wants one for its own page of an unknown address. */
export default function Layout({ children }) {
  return (
    <html lang="en">
      <body>{children}</body>
    </html>
  )
}
