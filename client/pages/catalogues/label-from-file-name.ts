/** 'lantern optical v2.csv.gz' -> 'lantern-optical-v2': a label to begin with. */
export function labelFromFileName(name: string): string {
  const bare = name.replace(/\.(gz|csv|tsv|txt|dat)$/gi, '').replace(/\.(csv|tsv|txt|dat)$/i, '');
  return bare
    .replace(/[^A-Za-z0-9_.-]+/g, '-')
    .replace(/^[^A-Za-z]+/, '')
    .slice(0, 20);
}
