/** The address people reach the application at: WIDEBERTH_URL, or localhost with the port served. Links in mails begin with it. */
export function publicAddress(environment: NodeJS.ProcessEnv = process.env): URL {
  const given = environment.WIDEBERTH_URL
  if (!given) return new URL(`http://localhost:${environment.NITRO_PORT || environment.PORT || 3000}`)
  if (!URL.canParse(given) || !/^https?:$/.test(new URL(given).protocol)) throw new Error(`WIDEBERTH_URL must be an address such as https://margins.example.org, not '${given}'.`)
  return new URL(given)
}
