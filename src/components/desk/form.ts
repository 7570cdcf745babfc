/** PostgreSQL's text cannot hold NUL, and nobody types it. */
function withoutNul(text: string): string {
  return text.replaceAll('\0', '');
}

/** What was typed into a form, kept when it is shown again. */
export class Typed {
  constructor(private readonly data: FormData | null = null) {}

  /** The text of a field; `otherwise` where the form was not sent yet. */
  text(field: string, otherwise = ''): string {
    if (!this.data) return withoutNul(otherwise);
    const value = this.data.get(field);
    return typeof value === 'string' ? withoutNul(value) : '';
  }

  /** Whether a box is ticked; `otherwise` where the form was not sent yet. */
  isTicked(field: string, otherwise = false): boolean {
    return this.data ? this.data.has(field) : otherwise;
  }

  file(field: string): File | null {
    const value = this.data?.get(field);
    if (!(value instanceof File) || value.name === '') return null;
    const name = withoutNul(value.name);
    return name === value.name ? value : new File([value], name, { type: value.type });
  }
}

/**
 * A time in UTC as a `datetime-local` field gives it: `2031-10-01T07:00` or with seconds. Null for anything else.
 */
export function utcTime(text: string): Date | null {
  const match = /^(\d{4}-\d{2}-\d{2})[T ](\d{2}:\d{2})(:\d{2})?$/.exec(text.trim());
  if (!match) return null;
  const [, day, minutes, seconds = ':00'] = match;
  const at = new Date(`${day}T${minutes}${seconds}Z`);
  return Number.isNaN(at.getTime()) ? null : at;
}

/** A time as a `datetime-local` field takes it, in UTC. */
export function utcField(at: Date): string {
  return at.toISOString().slice(0, 19);
}

/** An address of ours to go back to after signing in; the desk's or the account's own otherwise. */
export function safeNext(next: string, otherwise: string): string {
  return /^\/(desk|account|admin)(\/[\w./-]*)?(\?[\w=&%.-]*)?$/.test(next) ? next : otherwise;
}
