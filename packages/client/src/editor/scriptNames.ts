/**
 * Names of cells that a script uses freely, in order of first mention: identifiers of its syntax tree that are not
 * declared in the script itself. Loads the grammar when first asked.
 */
export async function drawnNames(text: string, cells: readonly string[]): Promise<readonly string[]> {
  const { javascriptLanguage } = await import('@codemirror/lang-javascript');
  const known = new Set(cells);
  const used = new Set<string>();
  const declared = new Set<string>();
  javascriptLanguage.parser.parse(text).iterate({
    enter({ name, from, to }) {
      if (name === 'VariableName') used.add(text.slice(from, to));
      else if (name === 'VariableDefinition') declared.add(text.slice(from, to));
    },
  });
  return [...used].filter((name) => known.has(name) && !declared.has(name));
}
