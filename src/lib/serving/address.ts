/** Addresses that begin with an economy's code as their second part. */
const BY_CODE = /^\/(economies|releases|images)\/([a-z]{3})(?=\/|$)/i;
const SERIES_FILE = /^\/data\/([a-z]{3})\.([a-z_]+)\.([mqa])\.csv$/i;

/**
 * The one address a public page or file has: codes in capitals, pages with a slash at the end, the rest in small
 * letters. Answers the address itself where it is right already.
 */
export function canonicalAddress(path: string): string {
  const series = SERIES_FILE.exec(path);
  if (series) {
    const [, code, concept, frequency] = series;
    return `/data/${code!.toUpperCase()}.${concept!.toLowerCase()}.${frequency!.toUpperCase()}.csv`;
  }
  const byCode = path.replace(
    BY_CODE,
    (_, kind: string, code: string) => `/${kind.toLowerCase()}/${code.toUpperCase()}`,
  );
  const last = byCode.slice(byCode.lastIndexOf('/') + 1);
  return last === '' || last.includes('.') ? byCode : `${byCode}/`;
}

/** The decoded path of a request's target, without its query; null where it cannot be decoded. */
export function pathOf(target: string): string | null {
  const end = target.search(/[?#]/);
  try {
    return decodeURIComponent(end < 0 ? target : target.slice(0, end));
  } catch {
    return null;
  }
}
