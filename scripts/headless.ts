import { isProblem, Problem } from '@/shared/contract/problem';

/** What a command without a server does: it answers with one JSON object, or throws what is wrong. */
export type Headless = (args: readonly string[]) => Promise<string>;

export interface Outcome {
  /** 0 with an answer, 2 when the input is at fault, 1 otherwise. */
  code: number;
  stdout: string;
  stderr: string;
}

export async function outcomeOf(command: Headless, args: readonly string[]): Promise<Outcome> {
  try {
    return { code: 0, stdout: `${await command(args)}\n`, stderr: '' };
  } catch (error) {
    const problem = isProblem(error)
      ? error
      : new Problem('internal', String((error as Error)?.message ?? error));
    const code = isProblem(error) && error.status < 500 ? 2 : 1;
    return { code, stdout: '', stderr: `${JSON.stringify(problem)}\n` };
  }
}

/** Answer the command line of this process. */
export async function runAsProgram(command: Headless): Promise<void> {
  const { code, stdout, stderr } = await outcomeOf(command, process.argv.slice(2));
  process.stdout.write(stdout);
  process.stderr.write(stderr);
  process.exitCode = code;
}
