import { callerFolder } from "./caller-folder.ts";
import { runCommand } from "./run-command.ts";

/** Answers the call that this process was started with. */
export function main({ packageRoot }: { readonly packageRoot: string }): void {
  const folder = callerFolder({ workingFolder: process.cwd(), packageRoot, initFolder: process.env.INIT_CWD });
  const result = runCommand({ args: process.argv.slice(2), folder, packageRoot });

  // Whoever reads the answer may close the pipe early (`offing ... | head`): no fault of theirs or ours.
  for (const stream of [process.stdout, process.stderr]) {
    stream.on("error", (error: NodeJS.ErrnoException) => {
      if (error.code !== "EPIPE") throw error;
    });
  }
  process.stderr.write(result.standardError);
  process.stdout.write(result.standardOutput);
  // Not process.exit, which would cut off output that a pipe has not taken yet.
  process.exitCode = result.status;
}
