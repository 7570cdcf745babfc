import rehypeSanitize, { defaultSchema } from 'rehype-sanitize';
import rehypeStringify from 'rehype-stringify';
import remarkParse from 'remark-parse';
import remarkRehype from 'remark-rehype';
import { unified } from 'unified';

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

const processor = unified()
  .use(remarkParse)
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

/** An explainer's Markdown as HTML that is safe inside a page, whoever wrote it. */
export function markdownToHtml(markdown: string): string {
  return String(processor.processSync(markdown));
}
