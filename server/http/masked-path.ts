const SECRET_OR_ID = /^[a-z2-7]{26,}$/

/** A path for the log: without its query, ids and the secrets of links (whoever reads the log could use those) as :id. */
export function maskedPath(path: string): string {
  const bare = path.split(/[?#]/)[0]!
  return bare.split('/').map(part => SECRET_OR_ID.test(part) || part.length > 60 ? ':id' : part).join('/')
}
