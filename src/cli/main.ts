import { version } from '../../package.json';
import { codeOf, EXIT, Failure, messageOf } from './failure.ts';
import { run } from './run.ts';

// A reader that has seen enough (`| head`) is no fault.
process.stdout.on('error', (error) => process.exit(codeOf(error) === 'EPIPE' ? EXIT.done : EXIT.badInput));
// Ending through `exit` lets an unfinished file be taken away.
for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const) process.on(signal, () => process.exit(130));

try {
  await run(process.argv.slice(2), version);
} catch (error) {
  const own = !(error instanceof Failure);
  console.error(
    `spooltable: ${messageOf(error).replace(/\s*\n\s*/g, ' ')}${own ? ' (a fault of the program itself, please report it)' : ''}`,
  );
  process.exitCode = own ? EXIT.ownFault : EXIT.badInput;
}
