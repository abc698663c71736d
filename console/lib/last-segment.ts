/**
 * What the last segment of an address stands for, decoded once. The router decodes an encoded slash a second time,
 * so that a name that holds `%2F` would be taken for another.
 */
export const lastSegment = (pathname: string): string =>
  decodeURIComponent(pathname.slice(pathname.lastIndexOf('/') + 1))
