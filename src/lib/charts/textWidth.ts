/**
 * Advance widths of Source Sans 3 from space to tilde, in thousandths of an em, read from the shipped files.
 * Neither a server nor a chart drawn before its font has loaded can measure text.
 */
const advances = {
  400: (
    '200 289 426 497 497 824 609 249 303 303 418 497 249 311 249 350 497 497 497 497 497 497 ' +
    '497 497 497 497 249 249 497 497 497 425 847 543 588 571 615 527 494 617 652 263 479 579 ' +
    '486 727 647 664 566 664 569 534 536 645 515 786 513 476 539 303 350 303 497 500 542 504 ' +
    '553 456 555 496 292 504 544 246 247 495 255 829 547 542 555 555 347 419 338 544 467 719 ' +
    '446 467 425 303 241 303 497'
  )
    .split(' ')
    .map(Number),
  600: (
    '200 315 482 513 513 841 639 275 324 324 438 513 275 322 275 344 513 513 513 513 513 513 ' +
    '513 513 513 513 275 275 513 513 513 444 875 558 597 576 625 538 510 628 663 282 494 597 ' +
    '502 745 657 674 582 674 592 545 546 655 536 800 541 501 540 324 344 324 513 500 549 516 ' +
    '563 462 564 507 317 520 558 262 263 522 271 843 560 549 564 564 373 431 361 556 495 748 ' +
    '481 495 443 324 255 324 513'
  )
    .split(' ')
    .map(Number),
};

export type TextWeight = keyof typeof advances;

/** Letters outside the table (accents, other scripts) count as a wide one, so that room is never too small. */
const unknown = 0.65;

const others: Record<string, number> = {
  '−': 0.513,
  '±': 0.513,
  '–': 0.48,
  '’': 0.275,
  '\u00a0': 0.2,
};

/** Width in px of `text` set in Source Sans 3 at `size` px. */
export function textWidth(text: string, size: number, weight: TextWeight = 400): number {
  const table = advances[weight];
  let em = 0;
  for (const character of text) {
    const advance = table[character.charCodeAt(0) - 32];
    em += advance !== undefined ? advance / 1000 : (others[character] ?? unknown);
  }
  return em * size;
}
