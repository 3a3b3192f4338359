import { version } from '../constants/version.js';

process.stdout.write(`${version}\n`);
