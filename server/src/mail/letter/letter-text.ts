import { CAUTION, type Letter } from './letter';
import { linesOf } from './letter-words';

/** The letter for those who read mail as text. */
export function letterText({ name, paragraphs, quote, facts, action, tellsResults, footing }: Letter): string {
  const blocks = [
    ...(name === undefined ? [] : [`${name},`]),
    ...paragraphs,
    ...(quote === undefined
      ? []
      : [
          linesOf(quote)
            .map((line) => `> ${line}`.trimEnd())
            .join('\n'),
        ]),
    ...(facts.length === 0 ? [] : [facts.map(({ label, value }) => `${label}: ${value}`).join('\n')]),
    `${action.label}:\n${action.url}`,
    ...(tellsResults ? [CAUTION] : []),
    `-- \n${footing}`,
  ];
  return `${blocks.join('\n\n')}\n`;
}
