import { describe, expect, it } from 'vitest';
import { Typed } from '../../src/components/desk/form.ts';

describe('what was typed', () => {
  it('never holds NUL, which PostgreSQL cannot store', () => {
    const data = new FormData();
    data.set('name', 'A\0l\0');
    data.set('file', new File(['x'], 'a\0.csv', { type: 'text/csv' }));
    const typed = new Typed(data);
    expect(typed.text('name')).toBe('Al');
    expect(typed.file('file')).toMatchObject({ name: 'a.csv', type: 'text/csv', size: 1 });
    expect(new Typed().text('name', 'A\0')).toBe('A');
  });
});
