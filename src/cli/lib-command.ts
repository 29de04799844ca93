/** What the commands share: arguments, files, and one way to end with a message instead of a stack. */
import { readFile } from 'node:fs/promises';
import { DEFAULT_ADJUSTABLES, parseAdjustables } from '@/lib/domain/default-adjustables';
import type { Adjustable, Forecast } from '@/lib/domain/types';
import { decodePassCsv, type PassCsvRow, parsePassCsv } from '@/lib/pass-csv';

/** Bad input: the message goes to stderr and the exit code is 1. */
export class CommandError extends Error {}

export interface Arguments {
  file: string | null;
  flags: ReadonlySet<string>;
  values: ReadonlyMap<string, string>;
}

/** Reads `FILE --flag --name value`. Unknown options are refused by name. */
export function readArguments(
  argv: readonly string[],
  flags: readonly string[],
  options: readonly string[],
): Arguments {
  const found: { file: string | null; flags: Set<string>; values: Map<string, string> } = {
    file: null,
    flags: new Set(),
    values: new Map(),
  };
  for (let i = 0; i < argv.length; i++) {
    const word = argv[i]!;
    if (flags.includes(word)) found.flags.add(word);
    else if (options.includes(word)) found.values.set(word, valueAfter(argv, i++));
    else if (word.startsWith('--'))
      throw new CommandError(`There is no option "${word}". Options: ${[...flags, ...options].join(', ')}.`);
    else if (found.file !== null) throw new CommandError(`Only one file is read; "${word}" is a second one.`);
    else found.file = word;
  }
  return found;
}

function valueAfter(argv: readonly string[], i: number): string {
  const value = argv[i + 1];
  if (value === undefined || value.startsWith('--')) throw new CommandError(`Option ${argv[i]} needs a file after it.`);
  return value;
}

/** Runs a command: 0 when done, 1 with a message on stderr when the input is bad. Never a stack. */
export async function runCommand(help: string, main: (argv: readonly string[]) => Promise<void>): Promise<void> {
  const argv = process.argv.slice(2);
  if (argv.includes('--help')) {
    process.stdout.write(`${help}\n`);
    return;
  }
  try {
    await main(argv);
  } catch (error) {
    process.stderr.write(`${messageOf(error)}\n`);
    process.exitCode = 1;
  }
}

function messageOf(error: unknown): string {
  if (error instanceof Error) return error.message.split('\n    at ')[0]!;
  return String(error);
}

async function readBytes(path: string): Promise<Uint8Array> {
  try {
    return await readFile(path);
  } catch (error) {
    throw new CommandError(`Cannot read "${path}": ${fileProblem(error)}.`);
  }
}

function fileProblem(error: unknown): string {
  const code = (error as NodeJS.ErrnoException).code;
  if (code === 'ENOENT') return 'there is no such file';
  if (code === 'EISDIR') return 'it is a folder';
  return code === 'EACCES' ? 'it may not be opened' : 'it could not be opened';
}

/** Reads a JSON file. */
export async function readJsonFile(path: string): Promise<unknown> {
  const text = new TextDecoder().decode(await readBytes(path));
  try {
    return JSON.parse(text);
  } catch {
    throw new CommandError(`"${path}" is not valid JSON.`);
  }
}

/** The adjustables named by --adjustables, or the defaults. */
export async function readAdjustables(args: Arguments): Promise<Adjustable[]> {
  const path = args.values.get('--adjustables');
  return path ? parseAdjustables(await readJsonFile(path)) : DEFAULT_ADJUSTABLES;
}

const SHOWN_REFUSALS = 20;

/**
 * Reads the passes of a CSV file. Rows that cannot be read end the command, with row, column and reason, unless
 * --skip-refused was given; notes and ignored columns go to stderr.
 */
export async function readPassFile(args: Arguments, adjustables: readonly Adjustable[]): Promise<PassCsvRow[]> {
  if (!args.file) throw new CommandError('Name a pass CSV file. --help says how.');
  const decoded = decodePassCsv(await readBytes(args.file));
  if (decoded.text === null) throw new CommandError(decoded.fileError);
  const parsed = parsePassCsv(decoded.text, [...adjustables]);
  if (parsed.fileError) throw new CommandError(parsed.fileError);
  const refused = parsed.refused
    .slice(0, SHOWN_REFUSALS)
    .map((r) => `row ${r.row}${r.column ? `, ${r.column}` : ''}: ${r.reason}`);
  if (parsed.refused.length > SHOWN_REFUSALS) refused.push(`and ${parsed.refused.length - SHOWN_REFUSALS} more`);
  const lines = [
    ...parsed.notes,
    ...(parsed.unknownColumns.length > 0 ? [`Ignored columns: ${parsed.unknownColumns.join(', ')}.`] : []),
    ...refused,
  ];
  if (parsed.refused.length > 0 && !args.flags.has('--skip-refused')) {
    throw new CommandError([...refused, 'Mend these rows, or give --skip-refused to go on without them.'].join('\n'));
  }
  if (lines.length > 0) process.stderr.write(`${lines.join('\n')}\n`);
  if (parsed.rows.length === 0) throw new CommandError('The file holds no passes.');
  return parsed.rows;
}

const round = (v: number, digits: number): number => Number(v.toFixed(digits));

/** A forecast as the commands print it: slip percent and odds. */
export function forecastJson(f: Forecast) {
  return {
    mean: round(f.meanPct, 4),
    sd: round(f.sdPct, 4),
    quantiles: Object.fromEntries(Object.entries(f.quantiles).map(([p, v]) => [p, round(v, 4)])),
    p_below: round(f.pBelow, 4),
    p_in_band: round(f.pInBand, 4),
    p_above: round(f.pAbove, 4),
  };
}

/** Whole percent for people. */
export const percent = (p: number): string => `${Math.round(p * 100)} %`;
