import { run } from './program.ts';
import { endQuietlyOnClosedPipe } from './terminal.ts';

endQuietlyOnClosedPipe();
await run(process.argv.slice(2));
