/** Text of the cells of every row of the first table of a class, whatever classes follow it. */
export function tableRows(html: string, className: string): readonly (readonly string[])[] {
  const table = html.slice(html.indexOf(`<table class="${className}`));
  const body = table.slice(table.indexOf('<tbody>'), table.indexOf('</tbody>'));
  const cells = (row: string) => [...row.matchAll(/<t[hd][^>]*>(.*?)<\/t[hd]>/gs)].map((m) => m[1] ?? '');
  return [...body.matchAll(/<tr[^>]*>(.*?)<\/tr>/gs)].map((m) => cells(m[1] ?? ''));
}
