/** What the desk does to a release. */
export type Step = 'submit' | 'sendBack' | 'approve' | 'schedule' | 'unschedule';

/** States as they are stored; `published` is a scheduled release whose second has come. */
export type StoredState = 'draft' | 'in_review' | 'approved' | 'scheduled';
export type State = StoredState | 'published';

/** From which states a step is allowed, and where it leads. */
export const STEPS: Record<Step, { from: State[]; to: StoredState }> = {
  submit: { from: ['draft'], to: 'in_review' },
  sendBack: { from: ['in_review', 'approved'], to: 'draft' },
  approve: { from: ['in_review'], to: 'approved' },
  schedule: { from: ['approved'], to: 'scheduled' },
  unschedule: { from: ['scheduled'], to: 'approved' },
};

/** States in their order, with the word for each. */
export const STATES: { state: State; word: string }[] = [
  { state: 'draft', word: 'Draft' },
  { state: 'in_review', word: 'In review' },
  { state: 'approved', word: 'Approved' },
  { state: 'scheduled', word: 'Scheduled' },
  { state: 'published', word: 'Published' },
];

/** The state at an instant: a scheduled release is published once its second has come and its pages were ready. */
export function stateAt(release: { state: StoredState; ready_for: Date | null }, at: Date): State {
  const isOut = release.ready_for !== null && release.ready_for <= at;
  return release.state === 'scheduled' && isOut ? 'published' : release.state;
}

/** Whether the step may be taken from the state. */
export function isAllowed(step: Step, state: State): boolean {
  return STEPS[step].from.includes(state);
}

/** The word a page shows for a state. */
export function wordOf(state: State): string {
  return STATES.find((one) => one.state === state)?.word ?? state;
}
