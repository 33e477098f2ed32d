import { parseArgs } from 'node:util';

export interface Arguments {
  readonly files: readonly string[];
  readonly flags: Readonly<Record<string, string | undefined>>;
}

/** What was asked on the command line; every flag takes a value. Throws on an unknown one. */
export const readArguments = (flags: readonly string[]): Arguments => {
  const { values, positionals } = parseArgs({
    args: process.argv.slice(2),
    allowPositionals: true,
    options: Object.fromEntries(flags.map((name) => [name, { type: 'string' as const }])),
  });
  return { files: positionals, flags: values as Record<string, string | undefined> };
};

/** Ends the program with words for whoever runs it, not with a trace. */
export const run = async (usage: string, work: () => Promise<number>): Promise<void> => {
  try {
    process.exitCode = await work();
  } catch (error) {
    console.error(error instanceof Error ? error.message : String(error));
    console.error(usage);
    process.exitCode = 1;
  }
};
