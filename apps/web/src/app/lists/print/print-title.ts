export interface PrintedFacts {
  readonly list: string;
  readonly network: string;
  readonly site: string;
  /** '' for the plain network. */
  readonly caseName: string;
  readonly filter: string;
  /** Whether the results are those of what is printed beside them. */
  readonly solved: boolean;
}

/** What a printed list is of, so that a sheet found on a desk says it. */
export function printTitle({ list, network, site, caseName, filter, solved }: PrintedFacts): string {
  const parts = [
    `${list} of ${network}, ${site}`,
    caseName === '' ? '' : `case ${caseName}`,
    filter === '' ? '' : `only those with “${filter}”`,
    solved ? '' : 'results are those of an earlier state',
  ];
  return parts.filter((part) => part !== '').join('; ');
}
