/** What the plan of a release needs to know of it. */
export interface Planned {
  economyCode: string;
  period: string;
  revision: number;
}

/** Pages of the site as a whole that any publication may change. */
export const SITE_PAGES = [
  '/',
  '/economies/',
  '/releases/',
  '/calendar/',
  '/method/',
  '/about/',
  '/api/',
  '/404/',
] as const;

/** The page of an economy. */
export function economyPage(code: string): string {
  return `/economies/${code}/`;
}

/** The pages of a release: the month's own address, which follows corrections, and the revision's, which never does. */
export function releasePages(release: Planned): string[] {
  const month = `/releases/${release.economyCode}/${release.period}/`;
  return [month, `${month}r${release.revision}/`];
}

/** Where an image frozen with a release is reached: pinned, by month, and by newest month. */
export function imageAddresses(release: Planned, name: string, isNewest: boolean): string[] {
  const economy = `/images/${release.economyCode}`;
  return [
    `${economy}/${release.period}/r${release.revision}/${name}`,
    `${economy}/${release.period}/${name}`,
    ...(isNewest ? [`${economy}/latest/${name}`] : []),
  ];
}

/** Where a data file frozen with a release is reached. */
export function releaseFile(releaseId: string, name: string): string {
  return `/data/releases/${releaseId}/${name}`;
}

/** The latest published values of a series, at an address a spreadsheet formula can hold. */
export function seriesFile(seriesId: string): string {
  return `/data/${seriesId}.csv`;
}
