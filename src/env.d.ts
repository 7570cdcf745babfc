/// <reference types="astro/client" />

declare namespace App {
  interface Locals {
    runtime: import('./lib/runtime.ts').Runtime;
    /** The instant the page shows: now, a coming moment, or a preview. */
    view: import('./lib/services/view.ts').View;
    /** Who is signed in; null on every stored page. */
    actor: import('./lib/services/context.ts').Actor | null;
    requestId: string;
  }
}
