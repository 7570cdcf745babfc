import { describe, expect, it } from 'vitest';
import { markdownToHtml } from '../../src/components/markdown.ts';

describe('an explainer’s Markdown', () => {
  it('keeps paragraphs, emphasis, lists and links', () => {
    expect(markdownToHtml('Money *grew*.\n\n- one\n- [two](https://example.org/)')).toBe(
      '<p>Money <em>grew</em>.</p>\n<ul>\n<li>one</li>\n<li><a href="https://example.org/">two</a></li>\n</ul>',
    );
  });

  it('begins its headings below the page’s own', () => {
    expect(markdownToHtml('# A\n\n## B\n\n### C')).toBe('<h3>A</h3>\n<h3>B</h3>\n<h4>C</h4>');
  });

  it.each([
    '<script>alert(1)</script>',
    '<p style="position:fixed" onclick="alert(1)" class="hero">x</p>',
    '[x](javascript:alert(1))',
    '![x](https://example.org/x.png)',
    '<iframe src="https://example.org"></iframe>',
    '<a href="data:text/html,x">x</a>',
    '[x]: javascript:alert(1)\n\n[x]',
  ])('lets nothing through that runs, loads or restyles: %s', (markdown) => {
    expect(markdownToHtml(markdown)).not.toMatch(/script|style|class|onclick|<img|iframe|data:/);
  });

  it.each([
    ['quotations', '>'.repeat(19_990)],
    ['lists', '- '.repeat(9_990)],
    ['numbered lists', '1. '.repeat(6_000)],
    ['emphasis', `${'*'.repeat(400)}x${'*'.repeat(400)}`],
    ['indented lists', Array.from({ length: 138 }, (_, i) => `${' '.repeat(2 * i)}- a`).join('\n')],
  ])('stands as typed where it nests beyond sense: %s', (_, nested) => {
    const html = markdownToHtml(`${nested}\n\n<b>&`);
    expect(html).toBe(`<p>${nested}\n\n&#x3C;b>&#x26;</p>`);
  });
});
