/** A destination of the masthead; `id` is what a page names as the current one. */
export interface Destination {
  id: string;
  label: string;
  href: string;
}

export const publicDestinations: Destination[] = [
  { id: 'economies', label: 'Economies', href: '/economies/' },
  { id: 'explainers', label: 'Explainers', href: '/releases/' },
  { id: 'calendar', label: 'Calendar', href: '/calendar/' },
  { id: 'data', label: 'Data and API', href: '/api/' },
  { id: 'method', label: 'Method', href: '/method/' },
];
