import type { CellJob } from '@stillroom/shared/cells';
import type { EngineReport, EngineRequest } from '@stillroom/shared/protocol';
import { type EngineControl, evaluateCell } from '../engine/index.ts';
import type { MendableScriptEngine } from '../script/index.ts';
import { NetworkMemory } from './network-memory.ts';
import { loadScripts } from './script-files.ts';
import { StopWatch } from './stop-watch.ts';
import { warmUp } from './warm-up.ts';

/** Milliseconds between two reports of progress. */
const reportEvery = 150;

/** Bytes of memory above which a process is not used again: what a run took is not always given back. */
const largestKept = 500 * 1024 * 1024;

const stopWatch = new StopWatch();
const networks = new NetworkMemory();
let scripts: Promise<MendableScriptEngine> | null = null;

const report = (message: EngineReport): void => {
  process.send?.(message);
};

/** The sandbox, loaded when it is first needed and whole again after whatever the last script did to it. */
async function readyScripts(): Promise<MendableScriptEngine> {
  scripts ??= loadScripts(new URL('.', import.meta.url));
  const engine = await scripts;
  await engine.mend();
  return engine;
}

function controlOf(run: number, engine: MendableScriptEngine | null): EngineControl {
  let nextReport = performance.now() + reportEvery;
  return {
    checkpoint(progress, words) {
      stopWatch.check();
      const now = performance.now();
      if (now < nextReport) return;
      nextReport = now + reportEvery;
      report({
        type: 'progress',
        run,
        ...(progress === undefined ? {} : { progress }),
        ...(words === undefined ? {} : { words }),
      });
    },
    readNetwork: (text) => networks.read(text),
    ...(engine === null ? {} : { scripts: engine }),
  };
}

async function run(number: number, job: CellJob): Promise<void> {
  const engine = job.kind === 'script' ? await readyScripts() : null;
  stopWatch.begin(number);
  const outcome = evaluateCell(job, controlOf(number, engine));
  const last = process.memoryUsage.rss() > largestKept;
  report({ type: 'done', run: number, outcome, last });
  if (last) process.disconnect();
  // Once the answer is on its way: the next script finds the sandbox as it is to begin.
  else if (engine !== null) setImmediate(() => void engine.mend());
}

process.on('message', (message: EngineRequest) => {
  if (message.type === 'warm') {
    void readyScripts();
  } else {
    endWarmUp();
    void run(message.run, message.job);
  }
});
process.on('disconnect', () => process.exit(0));
const endWarmUp = warmUp();
report({ type: 'ready' });
