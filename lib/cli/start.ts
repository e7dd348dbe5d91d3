import { main } from './main';

/** `npm start`. */
await main('production');
