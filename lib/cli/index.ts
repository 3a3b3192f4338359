import { main } from './main.js';

// `plumbtick predict file | head` closes the pipe early: that is no fault; a full disk is
for (const stream of [process.stdout, process.stderr])
  stream.on('error', (error: NodeJS.ErrnoException) => process.exit(error.code === 'EPIPE' ? 0 : 1));

// no process.exit: it would cut a long output to a pipe
process.exitCode = await main(process.argv.slice(2));
