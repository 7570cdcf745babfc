import type { Api } from './context.ts';
import { ProblemError, problemType } from './problems.ts';

/** Answers 405, with the methods there are, at every address that exists. Call it after all routes are registered. */
export function refuseOtherMethods(api: Api): void {
  const methods = new Map([['/openapi.json', ['GET']]]);
  for (const definition of api.openAPIRegistry.definitions) {
    if (definition.type !== 'route') continue;
    const { path, method } = definition.route;
    methods.set(path, [...(methods.get(path) ?? []), method.toUpperCase()]);
  }
  for (const [path, known] of methods) {
    const allow = [...(known.includes('GET') ? ['GET', 'HEAD'] : []), ...known, 'OPTIONS'];
    const list = [...new Set(allow)].join(', ');
    api.all(path.replaceAll(/\{(.+?)\}/g, ':$1'), (c) => {
      throw new ProblemError({
        status: 405,
        type: problemType('method-not-allowed'),
        title: 'That cannot be done here',
        detail: `This address takes ${list}, not ${c.req.method}.`,
        headers: { allow: list },
      });
    });
  }
}
