/** What a schema says, sentence by sentence under the path of its field; `whole` names what is wrong with no field in particular. */
export function sentencesOf(issues: readonly { path: readonly PropertyKey[]; message: string }[], whole = ''): Record<string, string[]> {
  const fields: Record<string, string[]> = {};
  for (const issue of issues) (fields[issue.path.join('.') || whole] ??= []).push(issue.message);
  return fields;
}

/** The first sentence of each field: a form has room for one. */
export const firstOf = (fields: Readonly<Record<string, readonly string[]>>): Record<string, string> => Object.fromEntries(Object.entries(fields).flatMap(([name, [first]]) => (first === undefined ? [] : [[name, first]])));
