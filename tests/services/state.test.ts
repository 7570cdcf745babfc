import { describe, expect, test } from 'vitest';
import {
  type State,
  type Step,
  isAllowed,
  stateAt,
} from '../../src/lib/services/releases/state.ts';

const states: State[] = ['draft', 'in_review', 'approved', 'scheduled', 'published'];

/** product.md: draft → in review → approved → scheduled → published; sent back to draft; taken off the schedule. */
const allowed: Record<Step, State[]> = {
  submit: ['draft'],
  sendBack: ['in_review', 'approved'],
  approve: ['in_review'],
  schedule: ['approved'],
  unschedule: ['scheduled'],
};

describe('the states of a release', () => {
  test.each(Object.entries(allowed) as [Step, State[]][])('%s', (step, from) => {
    for (const state of states)
      expect([state, isAllowed(step, state)]).toEqual([state, from.includes(state)]);
  });

  test('a scheduled release is published from its second on, where its pages were ready', () => {
    const second = new Date('2031-10-01T07:00:00Z');
    const before = new Date(second.getTime() - 1);
    const ready = { state: 'scheduled', ready_for: second } as const;
    expect(stateAt(ready, before)).toBe('scheduled');
    expect(stateAt(ready, second)).toBe('published');
    expect(stateAt({ ...ready, ready_for: null }, second)).toBe('scheduled');
  });
});
