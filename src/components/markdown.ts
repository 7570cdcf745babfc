import rehypeSanitize, { defaultSchema } from 'rehype-sanitize';
import rehypeStringify from 'rehype-stringify';
import remarkParse from 'remark-parse';
import remarkRehype from 'remark-rehype';
import { unified } from 'unified';
import { nestsTooDeep } from '../lib/services/releases/write.ts';

/**
 * What an explainer may hold: text, lists, quotations, headings below the page's own, links. No images, no HTML of
 * its own, and no style or class, which the content policy or the look would be broken by.
 */
const schema = {
  ...defaultSchema,
  tagNames: [
    'p',
    'h2',
    'h3',
    'h4',
    'ul',
    'ol',
    'li',
    'blockquote',
    'strong',
    'em',
    'a',
    'code',
    'pre',
    'br',
    'hr',
  ],
  attributes: { a: ['href', 'title'], ol: ['start'] },
  protocols: { href: ['http', 'https', 'mailto'] },
  clobberPrefix: '',
};

/** More than an explainer needs, far fewer than the stack holds. */
const DEEPEST = 60;

const processor = unified()
  .use(remarkParse)
  .use(() => refuseDeep)
  .use(remarkRehype)
  .use(() => demoteHeadings)
  .use(rehypeSanitize, schema)
  .use(rehypeStringify);

interface Node {
  type: string;
  tagName?: string;
  children?: Node[];
}

/** A page has one h1 and the explainer stands in a section of it: its headings begin at h3. */
function demoteHeadings(tree: Node): void {
  for (const node of tree.children ?? []) {
    const level = /^h([1-6])$/.exec(node.tagName ?? '')?.[1];
    if (level) node.tagName = Number(level) < 3 ? 'h3' : 'h4';
    demoteHeadings(node);
  }
}

class TooDeepError extends Error {}

/** Emphasis and indented lists nest too; what follows walks the tree by recursion. */
function refuseDeep(tree: Node): void {
  let level: Node[] = [tree];
  for (let depth = 0; level.length > 0; depth += 1) {
    if (depth > DEEPEST) throw new TooDeepError();
    level = level.flatMap((node) => node.children ?? []);
  }
}

/**
 * An explainer's Markdown as HTML that is safe inside a page, whoever wrote it. What is nested beyond all sense stands
 * as it was typed: one explainer must never keep a page from being drawn.
 */
export function markdownToHtml(markdown: string): string {
  // Before parsing, which takes minutes over thousands of list marks.
  if (nestsTooDeep(markdown)) return asTyped(markdown);
  try {
    return String(processor.processSync(markdown));
  } catch (error) {
    if (error instanceof TooDeepError || error instanceof RangeError) return asTyped(markdown);
    throw error;
  }
}

function asTyped(text: string): string {
  return unified()
    .use(rehypeStringify)
    .stringify({
      type: 'root',
      children: [
        {
          type: 'element',
          tagName: 'p',
          properties: {},
          children: [{ type: 'text', value: text }],
        },
      ],
    });
}
