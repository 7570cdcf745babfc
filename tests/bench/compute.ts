import { spawnSync } from 'node:child_process';
import { compute } from '../../src/lib/econ/compute.ts';
import {
  regressionExpectation,
  type RegressionRule,
} from '../../src/lib/econ/expectations/regression.ts';
import { factorise } from '../../src/lib/econ/linear/householder.ts';
import { constant, equation } from '../../src/lib/econ/linear/equation.ts';
import { solve } from '../../src/lib/econ/linear/leastSquares.ts';
import { indicators, lagged, prepare, type Data } from '../../src/lib/econ/series.ts';
import type { ComputeRequest, Expectation } from '../../src/lib/econ/types.ts';
import { startBrowser } from '../setup/browser.ts';
import { econScript } from '../setup/econScript.ts';

/** Runs a measurement is taken over, after as many to warm up. */
const RUNS = 21;
const YEARS = 65;

const window = { kind: 'expanding', length: 60 } as const;
const plain: RegressionRule = { rule: 'autoregression', order: 12, window };
const seasonal: RegressionRule = { ...plain, seasonal: 'dummies' };
const chosen: RegressionRule = { ...seasonal, order: { criterion: 'bic', max: 12 } };

interface Time {
  least: number;
  median: number;
}

/** Minimum and median time of a piece of work, in milliseconds. */
function measure(work: () => void, runs = RUNS): Time {
  return measureInTurns([work], runs)[0]!;
}

/** The same for several pieces whose ratio matters, run in turns so that a busy machine slows all alike. */
function measureInTurns(works: (() => void)[], runs = RUNS): Time[] {
  const times = works.map(() => [] as number[]);
  for (let run = -runs; run < runs; run++) {
    works.forEach((work, i) => {
      const start = performance.now();
      work();
      if (run >= 0) times[i]!.push(performance.now() - start);
    });
  }
  return times.map((each) => {
    each.sort((a, b) => a - b);
    return { least: each[0]!, median: each[Math.floor(each.length / 2)]! };
  });
}

/** A made-up monthly economy of so many years, from a fixed seed. */
function economy(years: number): ComputeRequest {
  let state = 20_311_001;
  const uniform = () => {
    state = (state * 48_271) % 2_147_483_647;
    return state / 2_147_483_647 - 0.5;
  };
  const n = 12 * years;
  const levels = (drift: number, spread: number) => {
    let log = 460;
    return Array.from({ length: n }, () => Math.exp((log += drift + spread * uniform()) / 100));
  };
  return {
    frequency: 'monthly',
    money: { start: '1960-01', values: levels(0.5, 2) },
    prices: { start: '1960-01', values: levels(0.3, 1) },
    activity: { start: '1960-01', values: levels(0.2, 1) },
    expectation: plain,
    slope: { method: 'prices' },
    gap: { persistence: 'estimated' },
  };
}

/** What the updating replaces: a fresh QR of the whole window at every target. Returns the sum of the forecasts. */
function refit(data: Data, rule: RegressionRule & { order: number }): number {
  const lags = Array.from({ length: rule.order }, (_, j) => lagged(data.growth, j + 1));
  const fixed = [constant(data.length), ...(rule.seasonal === 'dummies' ? indicators(data) : [])];
  const { y, columns } = equation(data.growth, [...fixed, ...lags]);
  let sum = 0;
  for (let n = rule.window.length; n < y.length; n++) {
    const { coefficients } = solve(
      factorise(columns.map((column) => column.subarray(0, n))),
      y.subarray(0, n),
    );
    coefficients.forEach((b, j) => (sum += b * columns[j]![n]!));
  }
  return sum;
}

function line(what: string, time: Time, more = ''): void {
  const figures = `${time.least.toFixed(2).padStart(8)} ms least ${time.median.toFixed(2).padStart(8)} ms median`;
  console.log(`${what.padEnd(64)}${figures}${more && `   ${more}`}`);
}

function compareWithRefitting(
  what: string,
  data: Data,
  rule: RegressionRule & { order: number },
): number {
  const updating = measure(() => void regressionExpectation(data, rule, 0));
  const refitting = measure(() => void refit(data, rule), 3);
  const path = regressionExpectation(data, rule, 0);
  const difference = Math.abs(
    path.expected.reduce((sum, value) => sum + value, 0) - refit(data, rule),
  );
  line(`${what}, updated`, updating);
  line(`${what}, refitted by QR at each target`, refitting);
  const ratio = refitting.least / updating.least;
  console.log(
    `  updating is ${ratio.toFixed(1)} times as fast; sums of forecasts differ by ${difference.toExponential(1)}`,
  );
  return ratio;
}

/** The whole computation in a tab of Chromium. */
async function measureInTab(asked: ComputeRequest): Promise<Time> {
  const browser = await startBrowser();
  try {
    const page = await browser.open();
    await page.addScriptTag({ content: await econScript() });
    const times = await page.evaluate(
      ({ asked, runs }) => {
        const { econ } = globalThis as unknown as { econ: { compute(request: unknown): unknown } };
        const taken: number[] = [];
        for (let run = -runs; run < runs; run++) {
          const start = performance.now();
          econ.compute(asked);
          if (run >= 0) taken.push(performance.now() - start);
        }
        return taken.sort((a, b) => a - b);
      },
      { asked, runs: RUNS },
    );
    return { least: times[0]!, median: times[Math.floor(times.length / 2)]! };
  } finally {
    await browser.close();
  }
}

/** The same refitting by R's lm.fit: its least time and the sum of its forecasts; a sentence where it cannot be had. */
function refitInR(data: Data, order: number): { least: number; sum: number } | string {
  if (spawnSync('Rscript', ['--version']).error !== undefined) {
    return "Rscript is not at hand, so R's lm.fit is left out (Debian: apt-get install r-base-core).";
  }
  const script = `
    d <- scan(file("stdin"), quiet = TRUE); P <- ${order}; T <- length(d);
    X <- cbind(1, outer(seq_len(T) %% 12, 1:11, "==") * 1, sapply(1:P, function(j) c(rep(NA, j), d[1:(T - j)])))
    X <- X[(P + 1):T, ]; y <- d[(P + 1):T]
    run <- function() { sum <- 0
      for (n in ${window.length}:(length(y) - 1)) {
        i <- seq_len(n); sum <- sum + sum(lm.fit(X[i, ], y[i])$coefficients * X[n + 1, ]) }
      sum }
    cat(format(run(), digits = 15), min(replicate(3, system.time(run())["elapsed"])) * 1000)`;
  const input = Array.from(data.growth.subarray(1)).join('\n');
  const { status, stdout, stderr } = spawnSync('Rscript', ['-e', script], {
    input,
    encoding: 'utf8',
  });
  const [sum, least] = stdout.split(' ').map(Number);
  if (status !== 0 || !sum || !least) return `R is at hand, but its run failed: ${stderr.trim()}`;
  return { least, sum };
}

const request = economy(YEARS);
const data = prepare(request);
const twice = prepare(economy(2 * YEARS));

console.log(`${YEARS} years monthly, every target from month ${window.length} on; ${RUNS} runs\n`);
compareWithRefitting('AR(12)', data, plain as RegressionRule & { order: number });
compareWithRefitting(
  'AR(12) with seasonal indicators',
  data,
  seasonal as RegressionRule & { order: number },
);
line(
  'Order 0 to 12 by BIC at every target, seasonal indicators',
  measure(() => void regressionExpectation(data, chosen, 0)),
);
const [once, doubled] = measureInTurns(
  [data, twice].map((one) => () => void regressionExpectation(one, seasonal, 0)),
  2 * RUNS,
) as [Time, Time];
line(
  'AR(12) with seasonal indicators, twice the years',
  doubled,
  `${(doubled.least / once.least).toFixed(2)} times`,
);
const rolling: Expectation = { ...seasonal, window: { kind: 'rolling', length: 120 } };
line(
  'AR(12) with seasonal indicators, rolling 120',
  measure(() => void regressionExpectation(data, rolling, 0)),
);
const whole: ComputeRequest = { ...request, expectation: chosen };
const inNode = measure(() => void compute(whole));
line('The whole computation: BIC, prices, activity, every test', inNode);
const inTab = await measureInTab(whole);
line('  the same in a browser tab', inTab, `${(inTab.least / inNode.least).toFixed(2)} times`);

const inR = refitInR(data, 12);
if (typeof inR === 'string') {
  console.log(inR);
} else {
  const sum = regressionExpectation(data, seasonal, 0).expected.reduce(
    (total, one) => total + one,
    0,
  );
  console.log(
    `AR(12) with seasonal indicators, refitted by R's lm.fit: ${inR.least.toFixed(0)} ms least, ${(inR.least / once.least).toFixed(0)} times the updating; sums of forecasts differ by ${Math.abs(sum - inR.sum).toExponential(1)}`,
  );
}
