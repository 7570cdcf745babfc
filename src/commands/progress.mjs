const HEARTBEAT_MS = 20_000;

/** How long, in words: "0.4 s", "48 s", "2 min 5 s". */
export function duration(ms) {
  if (ms < 9_950) return `${(ms / 1000).toFixed(1)} s`;
  const seconds = Math.round(ms / 1000);
  return seconds < 120 ? `${seconds} s` : `${Math.floor(seconds / 60)} min ${seconds % 60} s`;
}

/** Tells in words what is being done and for how long: a living line on a terminal, a line a step elsewhere. */
export class Progress {
  #text = '';
  #started = 0;
  #timer;
  #live = process.stdout.isTTY === true && !process.env.CI;

  /** Begins a step; the one before is done. */
  step(text) {
    this.done();
    this.#text = text;
    this.#started = performance.now();
    if (this.#live) process.stdout.write(this.#line());
    const tell = () => process.stdout.write(this.#live ? `\r${this.#line()}` : `${this.#line()}\n`);
    this.#timer = setInterval(tell, this.#live ? 1_000 : HEARTBEAT_MS);
    this.#timer.unref();
  }

  /** Ends the step with its time. */
  done() {
    if (!this.#text) return;
    clearInterval(this.#timer);
    process.stdout.write(`${this.#live ? '\r' : ''}${this.#line()}\n`);
    this.#text = '';
  }

  /** Ends the step because it failed or was broken off. */
  broken() {
    clearInterval(this.#timer);
    if (this.#text && this.#live) process.stdout.write('\n');
    this.#text = '';
  }

  #line() {
    return `${this.#text} … ${duration(performance.now() - this.#started)}`;
  }
}
