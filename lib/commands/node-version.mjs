const needed = [20, 9];
const [major, minor] = process.versions.node.split(".").map(Number);

// Runs before anything else of a command is evaluated, so that an old Node gets this line and not a stack.
if (major < needed[0] || (major === needed[0] && minor < needed[1])) {
  console.error(`Node.js ${needed.join(".")} or newer is needed; this is ${process.versions.node}.`);
  process.exit(1);
}
