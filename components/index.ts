export { version } from '../lib/constants/version.js';
