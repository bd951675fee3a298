// Checked before any other import, so that an old Node.js answers with a sentence and no stack.

/** What to do about this Node.js, or undefined when it will do (20.19 and later 20s, or 22 on). */
export function nodeComplaint(version = process.versions.node) {
  const [major, minor] = version.split('.').map(Number);
  if ((major === 20 && minor >= 19) || major >= 22) return undefined;
  return `This is Node.js ${version}; Meterwright needs Node.js 20.19 or later (20 or 22). Install it, then run the command again.`;
}
