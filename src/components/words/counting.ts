const words = [
  'none',
  'one',
  'two',
  'three',
  'four',
  'five',
  'six',
  'seven',
  'eight',
  'nine',
  'ten',
  'eleven',
  'twelve',
];

/** A count as running text has it: words up to twelve, then digits. */
export function numberWord(count: number): string {
  return words[count] ?? String(count);
}

/** Items as running text lists them: "a", "a and b", "a, b and c". */
export function listed(items: string[]): string {
  if (items.length < 2) return items[0] ?? '';
  return `${items.slice(0, -1).join(', ')} and ${items.at(-1)}`;
}

/** The first letter of a sentence as a capital. */
export function capitalised(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

/** A name's possessive: "Aldermark’s", "the Brannoch Isles’". */
export function possessive(name: string): string {
  return name.endsWith('s') ? `${name}’` : `${name}’s`;
}
