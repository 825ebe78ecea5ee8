/** What to do about a syntax error of the YAML reader, from its code and the line in which it stands. */
export function yamlRemedy(code: string, line: string): string {
  // Only the beginning: the search takes quadratic time, and an expression this long stands in a block anyway.
  const value = line.slice(0, 500).replace(/^[^:]*:/, '');
  if (/\?.*:\s/.test(value)) {
    return 'Quote the expression, or write it below a | : in plain YAML a colon before a space ends a text.';
  }
  return remedies[code] ?? 'Check indentation, colons, brackets and quotes here; quote the text if it holds : or #.';
}

const remedies: Readonly<Record<string, string>> = {
  BAD_DIRECTIVE: 'Remove the line that begins with %.',
  BAD_DQ_ESCAPE: 'Use single quotes: in them a backslash stands for itself.',
  BAD_INDENT: 'Indent the keys of one mapping by the same number of spaces.',
  BAD_SCALAR_START: 'Quote the text: YAML gives its first character another meaning.',
  BLOCK_AS_IMPLICIT_KEY: 'Start a new line after the key, or quote the text: a colon before a space ends a plain text.',
  BLOCK_IN_FLOW: 'Quote the text: inside { } and [ ] the characters , : [ ] { } have a meaning.',
  MISSING_CHAR: 'Close the quote or bracket, put a comma between the items, and a space after a colon.',
  MULTILINE_IMPLICIT_KEY: 'Write the key on one line.',
  TAB_AS_INDENT: 'Indent with spaces, not tabs.',
  TAG_RESOLVE_FAILED: 'Remove the tag: quote a text that begins with an exclamation mark.',
};
