/** What parameters, functions, steps, arguments and aliases are called. */
export const namePattern = /^[A-Za-z][A-Za-z0-9_]*$/;

/** Sheet and constraint ids: lower case letters and digits, in words joined by hyphens. */
export const idPattern = /^[a-z0-9]+(-[a-z0-9]+)*$/;

/** `G(rs, A, a1)`. */
export const signaturePattern = /^[A-Za-z][A-Za-z0-9_]*\(\s*[A-Za-z][A-Za-z0-9_]*\s*(,\s*[A-Za-z][A-Za-z0-9_]*\s*)*\)$/;

/** Name and arguments of a signature that matches the pattern. */
export function splitSignature(signature: string): { readonly name: string; readonly arguments: readonly string[] } {
  const open = signature.indexOf('(');
  const list = signature.slice(open + 1, -1).split(',');
  return { name: signature.slice(0, open), arguments: list.map((argument) => argument.trim()) };
}
