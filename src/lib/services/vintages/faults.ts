import { ServiceError } from '../context.ts';

/** What is wrong at one place of a data file. */
export interface FileFault {
  /** Counted from 1, as an editor of texts counts; 0 where it is the file as a whole. */
  line: number;
  /** The column's name, or its number where it has none; empty where it is the whole line or file. */
  column: string;
  /** What stands there, shortened. */
  found: string;
  /** What should stand there. */
  expected: string;
}

/** Faults told at once; a file with more of them has one cause, and the rest is only counted. */
export const FAULTS_TOLD = 100;

/** A data file with faults: nothing of it is stored. */
export class VintageFileError extends ServiceError {
  constructor(
    readonly fileFaults: FileFault[],
    /** How many there are, told or not. */
    readonly count: number,
  ) {
    const told = fileFaults.map((fault) => ({ field: placeOf(fault), message: sentenceOf(fault) }));
    super('invalid', summaryOf(count, fileFaults.length), told);
    this.name = 'VintageFileError';
  }
}

/** Collects faults, the first hundred in full. */
export class FaultList {
  readonly told: FileFault[] = [];
  count = 0;

  add(line: number, column: string, found: string, expected: string): void {
    this.count += 1;
    if (this.told.length < FAULTS_TOLD) {
      this.told.push({ line, column, found: shortened(found), expected });
    }
  }

  /** @throws VintageFileError when there is any fault. */
  refuseAny(): void {
    if (this.count === 0) return;
    this.told.sort((a, b) => a.line - b.line);
    throw new VintageFileError(this.told, this.count);
  }
}

function placeOf({ line, column }: FileFault): string {
  if (line === 0) return 'file';
  return column === '' ? `line ${line}` : `line ${line}, ${column}`;
}

function sentenceOf({ found, expected }: FileFault): string {
  return `Found ${found}; expected ${expected}.`;
}

function summaryOf(count: number, told: number): string {
  const faults = count === 1 ? 'one fault' : `${count.toLocaleString('en-GB')} faults`;
  const rest = count > told ? ` The first ${told} are listed.` : '';
  return `The file has ${faults}; nothing of it was stored.${rest}`;
}

function shortened(text: string): string {
  return text.length > 80 ? `${text.slice(0, 79)}…` : text;
}

/** A cell as a message quotes it. */
export function quoted(cell: string): string {
  return cell === '' ? 'an empty cell' : `“${shortened(cell)}”`;
}
