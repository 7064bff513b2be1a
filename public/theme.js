/*
 * Runs before the first paint, so that nobody in the dark gets a white page. Reads what
 * components/field/theme.ts kept: the choice and the next nights (civil dusk to civil dawn, ms).
 */
;(() => {
  const GROUND = { day: '#fcfcf6', shade: '#ebdcb9', night: '#0b0806' }
  let kept = null
  try {
    kept = JSON.parse(localStorage.getItem('farbench-theme'))
  } catch {
    kept = null
  }
  const asks = (query) => matchMedia(query).matches
  const first = asks('(prefers-color-scheme: dark)') && !asks('(prefers-contrast: more)')
  const choice = kept?.choice ?? (first ? 'night' : 'auto')
  const nights = Array.isArray(kept?.nights) ? kept.nights : []
  const now = Date.now()
  const dark = nights.some(([from, to]) => now >= from && now < to)
  const theme = choice in GROUND ? choice : dark ? 'night' : 'day'
  document.documentElement.dataset.theme = theme
  document.querySelector('meta[name="theme-color"]')?.setAttribute('content', GROUND[theme])
})()
