// For commands whose standard output carries one JSON object and nothing else.

/** Runs `work` with everything it says on standard output sent to standard error instead. */
export async function aside(work) {
  const write = process.stdout.write;
  process.stdout.write = process.stderr.write.bind(process.stderr);
  try {
    return await work();
  } finally {
    process.stdout.write = write;
  }
}

/** npm runs scripts in the project's folder and tells the caller's; a direct call is in it. */
export function callersFolder(script) {
  const { npm_lifecycle_event: event, INIT_CWD: folder } = process.env;
  return event === script && folder ? folder : process.cwd();
}

/** Prints the end of a command and answers with its exit code. */
export function printEnd({ output, complaints, code }) {
  if (complaints.length > 0) process.stderr.write(`${complaints.join("\n")}\n`);
  if (output !== null) process.stdout.write(`${output}\n`);
  return code;
}
