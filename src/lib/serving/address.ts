/** Addresses that begin with an economy's code as their second part. */
const BY_CODE = /^\/(economies|releases|images)\/([a-z]{3})(?=\/|$)/;
const QUARTER = /(?<=\/\d{4}-)q(?=[1-4](\/|$))/;
const SERIES_FILE = /^\/data\/([a-z]{3})\.([a-z_]+)\.([mqa])\.csv$/;
const RELEASE_FILE = /^\/data\/releases\/([^/]+)(\/.*)?$/i;

/**
 * The one address a public page or file has: codes and the Q of a quarter in capitals, pages with a slash at the end,
 * the rest in small letters but a release's id, which stays as it is. Answers the address itself where it is right
 * already.
 */
export function canonicalAddress(path: string): string {
  const release = RELEASE_FILE.exec(path);
  if (release) {
    const [, id, rest = ''] = release;
    return withSlash(`/data/releases/${id}${rest.toLowerCase()}`);
  }
  const small = path.toLowerCase();
  const series = SERIES_FILE.exec(small);
  if (series) {
    const [, code, concept, frequency] = series;
    return `/data/${code!.toUpperCase()}.${concept}.${frequency!.toUpperCase()}.csv`;
  }
  return withSlash(
    small
      .replace(BY_CODE, (_, kind: string, code: string) => `/${kind}/${code.toUpperCase()}`)
      .replace(QUARTER, 'Q'),
  );
}

function withSlash(path: string): string {
  const last = path.slice(path.lastIndexOf('/') + 1);
  return last === '' || last.includes('.') ? path : `${path}/`;
}

/** Dots and slashes in disguise: one reader of the address would take them for what another does not. */
const DISGUISED = /%(2e|2f|5c)/i;
/** What a URL parser would rewrite, NUL, and anything that was encoded twice. */
const CONFUSED = /^[^/]|^$|\/\/|\/\.{1,2}(\/|$)|[\\\0]|%[0-9a-f]{2}/i;

/**
 * The decoded path of a request's target, without its query; null where it cannot be decoded, or where handler, pages
 * and API could each take it for another path.
 */
export function pathOf(target: string): string | null {
  const end = target.search(/[?#]/);
  const raw = end < 0 ? target : target.slice(0, end);
  if (DISGUISED.test(raw)) return null;
  try {
    const path = decodeURIComponent(raw);
    return CONFUSED.test(path) ? null : path;
  } catch {
    return null;
  }
}
