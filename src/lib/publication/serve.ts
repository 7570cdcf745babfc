import type { IncomingMessage, ServerResponse } from 'node:http';
import { type Db, listen } from '../../../db/connection.ts';
import {
  type PublishedRow,
  currentRows,
  generationOf,
  moments,
  rowsSince,
} from '../../../db/queries/published.ts';
import { dueTimes } from '../../../db/queries/announcements.ts';
import type { Clock } from '../clock.ts';
import type { ArtefactStore, Encoding } from './store.ts';

/** Longest that a reader's cache may keep a page unasked, in seconds (API contract). */
const LONGEST_AGE = 30;
const ENCODINGS: Encoding[] = ['identity', 'br', 'gzip'];
const POLL_MS = 1_000;
const MEMORY_BYTES = 256 * 1024 * 1024;

/** What an address answers now. */
export interface Answer {
  row: PublishedRow;
  /** Seconds that a cache may keep it. */
  maxAge: number;
}

/**
 * All addresses of this process, answered from memory by the clock alone: at a release's second nothing has to
 * happen. Told of changes by NOTIFY, and looking every second besides, so that a lost notification heals.
 */
export class PublishedPages {
  #rows = new Map<string, PublishedRow[]>();
  #ready = new Set<number>();
  #due: number[] = [];
  #generation = -1n;
  #seenAt = new Date(0);
  #bytes = new Map<string, Promise<Uint8Array | null>>();
  #sizes = new Map<string, number>();
  #held = 0;
  #timer: NodeJS.Timeout | undefined;
  #stopListening: (() => Promise<void>) | undefined;
  #syncing: Promise<void> | undefined;

  constructor(
    private readonly db: Db,
    private readonly clock: Clock,
    private readonly store: ArtefactStore,
  ) {}

  /** Loads what is public and coming, then follows changes until `stop`. */
  async start(databaseUrl: string, onTrouble: (error: unknown) => void): Promise<void> {
    await this.sync();
    const again = () => this.sync().catch(onTrouble);
    this.#stopListening = await listen(databaseUrl, 'published', again);
    const poll = () => {
      this.#timer = setTimeout(() => void again().then(poll), POLL_MS);
      this.#timer.unref();
    };
    poll();
  }

  async stop(): Promise<void> {
    clearTimeout(this.#timer);
    await this.#stopListening?.();
  }

  /** Brings memory up to the database; calls while one runs share the next. */
  async sync(): Promise<void> {
    await this.#syncing?.catch(() => {});
    this.#syncing ??= this.#load().finally(() => {
      this.#syncing = undefined;
    });
    return this.#syncing;
  }

  async #load(): Promise<void> {
    this.#due = (await dueTimes(this.db, this.clock.now())).map((time) => time.getTime());
    const generation = await generationOf(this.db);
    if (generation === this.#generation) return;
    const at = this.clock.now();
    const first = this.#generation < 0n;
    const [rows, ready] = await Promise.all([
      first ? currentRows(this.db, at) : rowsSince(this.db, this.#generation, this.#seenAt),
      moments(this.db, this.#seenAt),
    ]);
    // A row can only have been taken back while its second was still to come, so what we held of later ones is void.
    const since = this.#seenAt.getTime();
    if (!first) {
      for (const [address, held] of this.#rows) {
        this.#rows.set(
          address,
          held.filter((row) => row.visible_from.getTime() <= since),
        );
      }
    }
    for (const time of this.#ready) if (time > since) this.#ready.delete(time);
    for (const moment of ready) this.#ready.add(moment.getTime());
    for (const row of rows) this.#insert(row);
    this.#generation = generation;
    this.#seenAt = at;
    // What becomes public soon is read now, so that its first reader does not wait for the disk.
    for (const row of rows) {
      if (row.visible_from <= at) continue;
      for (const encoding of ENCODINGS) await this.bytes(row.artefact_hash, encoding);
    }
  }

  #insert(row: PublishedRow): void {
    const held = (this.#rows.get(row.address) ?? []).filter(
      (other) => other.visible_from.getTime() !== row.visible_from.getTime(),
    );
    held.push(row);
    held.sort((a, b) => a.visible_from.getTime() - b.visible_from.getTime());
    this.#rows.set(row.address, held);
  }

  /** The latest row of an address whose second has come and whose moment is ready; null where there is none. */
  answer(address: string): Answer | null {
    const now = this.clock.now().getTime();
    const held = this.#rows.get(address);
    if (!held) return null;
    for (let i = held.length - 1; i >= 0; i--) {
      const row = held[i]!;
      const time = row.visible_from.getTime();
      if (time <= now && this.#ready.has(time)) return { row, maxAge: this.#maxAge(now) };
    }
    return null;
  }

  #maxAge(now: number): number {
    const next = this.#due.find((time) => time > now);
    const left = next === undefined ? LONGEST_AGE : Math.floor((next - now) / 1000);
    return Math.min(LONGEST_AGE, left);
  }

  /** Bytes of an artefact, from memory where they fit; null where that encoding is not kept. */
  async bytes(hash: string, encoding: Encoding): Promise<Uint8Array | null> {
    const key = `${hash}.${encoding}`;
    const known = this.#bytes.get(key);
    if (known) {
      // Those asked for last stand last, and the first are the first to go.
      this.#bytes.delete(key);
      this.#bytes.set(key, known);
      return known;
    }
    // Kept as a promise, so that many who ask at once read the disk once.
    const reading = this.store.get(hash, encoding);
    this.#bytes.set(key, reading);
    try {
      const read = await reading;
      this.#sizes.set(key, read?.byteLength ?? 0);
      this.#held += read?.byteLength ?? 0;
      this.#makeRoom();
      return read;
    } catch (error) {
      this.#bytes.delete(key);
      throw error;
    }
  }

  #makeRoom(): void {
    for (const key of this.#bytes.keys()) {
      if (this.#held <= MEMORY_BYTES) break;
      const size = this.#sizes.get(key);
      if (size === undefined) continue;
      this.#bytes.delete(key);
      this.#sizes.delete(key);
      this.#held -= size;
    }
  }

  /** Whether every page of the site's start is there. */
  get hasPages(): boolean {
    return this.answer('/') !== null;
  }
}

/** Sends an answer, in the encoding the reader takes, or 304 where the reader has it already. */
export async function send(
  pages: PublishedPages,
  answer: Answer,
  request: IncomingMessage,
  response: ServerResponse,
): Promise<void> {
  const { row, maxAge } = answer;
  let encoding = wanted(request.headers['accept-encoding']);
  let bytes = await pages.bytes(row.artefact_hash, encoding);
  if (!bytes && encoding === 'br') {
    encoding = 'gzip';
    bytes = await pages.bytes(row.artefact_hash, encoding);
  }
  if (!bytes) {
    encoding = 'identity';
    bytes = await pages.bytes(row.artefact_hash, encoding);
  }
  if (!bytes) throw new Error(`The bytes of ${row.address} are missing from the artefact store`);
  const etag = `"${row.artefact_hash.slice(0, 32)}${encoding === 'identity' ? '' : `-${encoding}`}"`;
  for (const [name, value] of Object.entries(row.headers)) response.setHeader(name, value);
  response.setHeader('etag', etag);
  response.setHeader('last-modified', row.visible_from.toUTCString());
  response.setHeader('cache-control', `public, max-age=${maxAge}`);
  response.setHeader('vary', 'accept-encoding');
  if (row.status === 200 && isKnown(request, etag, row.visible_from)) {
    response.writeHead(304).end();
    return;
  }
  if (encoding !== 'identity') response.setHeader('content-encoding', encoding);
  response.setHeader('content-length', bytes.byteLength);
  response.writeHead(row.status);
  response.end(request.method === 'HEAD' ? undefined : bytes);
}

function wanted(header: string | string[] | undefined): Encoding {
  const accepted = String(header ?? '')
    .split(',')
    .map((part) => part.trim().split(';'))
    .filter(([, weight]) => !/^\s*q=0(\.0*)?$/.test(weight ?? ''))
    .map(([name]) => name);
  if (accepted.includes('br')) return 'br';
  return accepted.includes('gzip') ? 'gzip' : 'identity';
}

function isKnown(request: IncomingMessage, etag: string, changed: Date): boolean {
  const none = request.headers['if-none-match'];
  if (none !== undefined) {
    return none
      .split(',')
      .some((tag) => tag.trim().replace(/^W\//, '') === etag || tag.trim() === '*');
  }
  const since = Date.parse(request.headers['if-modified-since'] ?? '');
  return !Number.isNaN(since) && Math.floor(changed.getTime() / 1000) * 1000 <= since;
}
