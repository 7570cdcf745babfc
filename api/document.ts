import type { Api } from './context.ts';
import { caching } from './middleware/caching.ts';
import { offers } from './middleware/formats.ts';
import { badRequest } from './problems.ts';

/** The API's version as its description tells it; the address holds the first part. */
const VERSION = '1.0.0';

const DESCRIPTION = `Money surprises and the output gaps they imply, as published, with every release kept.
Times are RFC 3339 in UTC; periods are months \`2031-04\`, quarters \`2031-Q2\` or years \`2031\`; a missing value is null.
Figures are implied by a model: not official statistics, not a forecast.`;

/** GET /openapi.json: what the API is, made from the routes themselves; no key is needed. */
export function registerDocument(api: Api, publicUrl: string): void {
  api.openAPIRegistry.registerComponent('securitySchemes', 'bearer', {
    type: 'http',
    scheme: 'bearer',
    description: 'A key made at /account/keys/.',
  });
  api.openAPIRegistry.registerComponent('securitySchemes', 'header', {
    type: 'apiKey',
    in: 'header',
    name: 'X-API-Key',
  });
  let document: object | undefined;
  api.get('/openapi.json', caching, offers('json'), (c) => {
    const [unknown] = Object.keys(c.req.query());
    if (unknown !== undefined) {
      const message = `There is no parameter "${unknown}" here.`;
      throw badRequest([{ parameter: unknown, message }]);
    }
    document ??= api.getOpenAPI31Document({
      openapi: '3.1.0',
      info: {
        title: 'Slackwater',
        version: VERSION,
        description: DESCRIPTION,
        license: { name: 'CC BY 4.0', url: 'https://creativecommons.org/licenses/by/4.0/' },
      },
      servers: [{ url: publicUrl }],
    });
    return c.json(document);
  });
}
