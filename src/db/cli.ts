import { basename, resolve } from 'node:path';
import { pathToFileURL } from 'node:url';

/**
 * Runs `main` when the module was started as a script; prints an error as one line and exits 1. The name is asked too, since
 * the build may fold the module into the server's own entry file.
 */
export function runAsScript(name: string, moduleUrl: string, main: () => Promise<void>): void {
  const started = process.argv[1];
  if (!started || !basename(started).startsWith(`${name}.`)) return;
  if (pathToFileURL(resolve(started)).href !== moduleUrl) return;
  main().catch((error: unknown) => {
    console.error(error instanceof Error ? error.message : String(error));
    process.exitCode = 1;
  });
}
