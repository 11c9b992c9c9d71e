// Runs on any Node that knows modules: keep to old syntax, import nothing.

const OLDEST = [20, 19];

/** Says in words what to do when this Node is too old, and ends the program. */
export function requireNode() {
  const version = process.versions.node.split('.').map(Number);
  const isRecent = version[0] > OLDEST[0] || (version[0] === OLDEST[0] && version[1] >= OLDEST[1]);
  if (isRecent) return;
  console.error(
    'Thrumbook needs Node ' +
      OLDEST.join('.') +
      ' or newer; this is Node ' +
      process.versions.node +
      '.\n' +
      'Install the current long-term version of Node (nodejs.org has it for every system) and start again.',
  );
  process.exit(1);
}
