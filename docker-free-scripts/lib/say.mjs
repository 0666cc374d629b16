/** A failure the person at the keyboard can act on: printed as one line, without a stack. */
export class PlainError extends Error {}

// A closed terminal must not keep a script from stopping what it started.
for (const stream of [process.stdout, process.stderr]) stream.on('error', () => undefined);

export function say(line) {
  process.stdout.write(`${line}\n`);
}

/** Runs a script's main function; a PlainError becomes one clear line and exit code 1, anything else keeps its stack. */
export async function runScript(main) {
  try {
    await main();
  } catch (error) {
    process.stderr.write(`${error instanceof PlainError ? error.message : (error?.stack ?? error)}\n`);
    process.exit(1);
  }
}
