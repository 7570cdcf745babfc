declare const __BUILD__: string | undefined;

/** Which build this is: a hash of its sources, put in by astro.config.mjs; `source` where nothing was built. */
export const buildId: string = typeof __BUILD__ === 'string' ? __BUILD__ : 'source';

/** Version of the published method (the method page); a change of any figure's definition raises it. */
export const methodVersion = '1.0';
