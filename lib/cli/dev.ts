import { main } from './main';

/** `npm run dev`: the same as `npm start` with a server that builds while it is worked on. */
await main('development');
