import { resolve } from "node:path";

/**
 * The folder that the caller's relative paths start from. A package script is run from the package's own folder,
 * wherever it was called; the folder it was called from is then left in INIT_CWD.
 */
export function callerFolder({ workingFolder, packageRoot, initFolder }: {
  readonly workingFolder: string;
  readonly packageRoot: string;
  readonly initFolder: string | undefined;
}): string {
  const runAsScript = resolve(workingFolder) === resolve(packageRoot);
  return runAsScript && initFolder !== undefined && initFolder !== "" ? initFolder : workingFolder;
}
