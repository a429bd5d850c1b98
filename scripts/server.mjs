// npm run server: one more process that serves, beside npm start or against DATABASE_URL.
import { runBeside } from './lib/beside.mjs';
import { main } from './lib/words.mjs';

await main(() => runBeside({ PROCESS: 'server', PORT: process.env.PORT || '7071' }, 'Serving'));
