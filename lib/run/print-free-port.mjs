import { freePort } from './support/free-port.mjs';

console.log(await freePort());
