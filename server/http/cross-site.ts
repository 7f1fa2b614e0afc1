export interface OriginHeaders {
  secFetchSite?: string | undefined
  origin?: string | undefined
  host?: string | undefined
}

/**
 * Whether a browser sent this from a page of another site. Sec-Fetch-Site decides where the browser tells it (it does on
 * https and localhost), else Origin against the base address and the Host. Programs send neither and carry no cookie.
 */
export function isCrossSite({ secFetchSite, origin, host }: OriginHeaders, baseUrl: string): boolean {
  if (secFetchSite !== undefined) return secFetchSite !== 'same-origin' && secFetchSite !== 'none'
  if (origin === undefined) return false
  if (origin === new URL(baseUrl).origin) return false
  return !URL.canParse(origin) || new URL(origin).host !== host
}
