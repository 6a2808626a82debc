/** What a source is called in a sentence: the catalogue goes before its designation unless that begins with it. */
export function sourceName({ catalogue, designation }: { catalogue: string; designation: string }): string {
  const named = designation.toLowerCase().startsWith(catalogue.toLowerCase());
  return named ? designation : `${catalogue} ${designation}`;
}
