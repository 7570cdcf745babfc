import { parseHTML } from 'linkedom';

let shared: Document | undefined;

/** The one document charts are drawn in on a server; nothing is ever attached to it. Not for the browser. */
export function serverDocument(): Document {
  shared ??= parseHTML('<!doctype html><html><body></body></html>').document;
  return shared;
}
