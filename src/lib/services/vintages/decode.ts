import { ServiceError } from '../context.ts';
import { FaultList } from './faults.ts';

/** Sixty-five years of months are some 30 kB; what is larger is another kind of file. */
export const LARGEST_FILE = 5 * 1024 * 1024;

const SIGNATURES: { bytes: number[]; what: string }[] = [
  {
    bytes: [0x50, 0x4b, 0x03, 0x04],
    what: 'a spreadsheet or another zipped file (it begins with PK)',
  },
  {
    bytes: [0xd0, 0xcf, 0x11, 0xe0, 0xa1, 0xb1, 0x1a, 0xe1],
    what: 'an older spreadsheet or document',
  },
  { bytes: [0x25, 0x50, 0x44, 0x46], what: 'a PDF' },
  { bytes: [0x1f, 0x8b], what: 'a gzip file' },
];

/**
 * The text of a CSV file in UTF-8.
 * @throws ServiceError `too_large`, or VintageFileError for a file that is empty, no text, or in another encoding.
 */
export function decodeCsv(bytes: Uint8Array): string {
  refuseLarge(bytes.length);
  const faults = new FaultList();
  if (bytes.length === 0) {
    faults.add(0, '', 'an empty file', 'a header line and one line a period');
    faults.refuseAny();
  }
  const known = SIGNATURES.find(({ bytes: begin }) => begin.every((byte, i) => bytes[i] === byte));
  if (known) {
    faults.add(0, '', known.what, 'plain text: export the sheet as CSV in UTF-8');
    faults.refuseAny();
  }
  const [first, second] = bytes;
  if ((first === 0xff && second === 0xfe) || (first === 0xfe && second === 0xff)) {
    faults.add(0, '', 'text in UTF-16', 'text in UTF-8: export the file again as CSV in UTF-8');
    faults.refuseAny();
  }
  const zero = bytes.indexOf(0);
  if (zero >= 0) {
    faults.add(
      lineOf(bytes, zero),
      '',
      'a zero byte, which no text has',
      'plain text: export the sheet as CSV in UTF-8',
    );
    faults.refuseAny();
  }
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    // The replacement sign stands where the first wrong byte was.
    const text = new TextDecoder('utf-8').decode(bytes);
    const before = text.slice(0, text.indexOf('\ufffd'));
    const line = before.split('\n').length;
    faults.add(
      line,
      '',
      `a sign that is not UTF-8 after ${quotedEnd(before)}`,
      'text in UTF-8: export the file again as CSV in UTF-8',
    );
    faults.refuseAny();
    throw new Error('unreachable');
  }
}

/** @throws ServiceError `too_large` when a file of that many bytes is not read. */
export function refuseLarge(size: number): void {
  if (size <= LARGEST_FILE) return;
  const has = (size / 1024 / 1024).toFixed(1);
  throw new ServiceError(
    'too_large',
    `The file has ${has} MB and at most ${LARGEST_FILE / 1024 / 1024} MB are read; nothing of it was stored. Sixty-five years of months are about 0.03 MB.`,
    [{ field: 'file', message: 'Choose a CSV file with one line a period.' }],
  );
}

function lineOf(bytes: Uint8Array, index: number): number {
  let line = 1;
  for (let i = 0; i < index; i += 1) if (bytes[i] === 0x0a) line += 1;
  return line;
}

function quotedEnd(text: string): string {
  const end = text.slice(text.lastIndexOf('\n') + 1).slice(-20);
  return end === '' ? 'the beginning of the line' : `“${end}”`;
}
