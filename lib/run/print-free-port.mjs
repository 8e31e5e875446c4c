import { freePort } from './support/free-port.mjs';

process.stdout.write(`${await freePort()}\n`);
