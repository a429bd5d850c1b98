// npm run worker: one more process that computes, beside npm start or against DATABASE_URL.
import { runBeside } from './lib/beside.mjs';
import { main } from './lib/words.mjs';

await main(() => runBeside({ PROCESS: 'worker' }, 'Computing'));
