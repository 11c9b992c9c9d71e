// Runs on any Node that knows modules: keep to old syntax, import nothing.

const OLDEST_MAJOR = 20;
const OLDEST_MINOR = 19;

/** Says in words what to do when this Node is too old, and ends the program. */
export function requireNode() {
  const match = /^(\d+)\.(\d+)/.exec(process.versions.node);
  const major = match ? Number(match[1]) : 0;
  const minor = match ? Number(match[2]) : 0;
  if (major > OLDEST_MAJOR || (major === OLDEST_MAJOR && minor >= OLDEST_MINOR)) return;
  console.error(
    `Thrumbook needs Node ${OLDEST_MAJOR}.${OLDEST_MINOR} or newer; this is Node ${process.versions.node}.\n` +
      'Install the current long-term version of Node (nodejs.org has it for every system) and start again.',
  );
  process.exit(1);
}
