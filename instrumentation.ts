/** Run by Next once, when the server begins. */
export async function register(): Promise<void> {
  if (process.env.NEXT_RUNTIME !== "nodejs") return;
  const { beginServing } = await import("#lib/http/begin-serving.ts");
  await beginServing();
}
