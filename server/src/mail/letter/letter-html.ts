import { CAUTION, type Letter } from './letter';
import { linesOf } from './letter-words';

/** The light theme's colours, theme/_tokens.scss of the pages; mail programs know no variables. */
const COLOUR = {
  ground: '#e6e8e2',
  sheet: '#fbfbf7',
  rule: '#d3d6cd',
  ink: '#17222a',
  ink2: '#445158',
  copper: '#94461a',
  onCopper: '#ffffff',
  watch: '#6b5300',
  watchWash: '#f5edcf',
} as const;
const FONT = "font-family:Inter,'Segoe UI',Helvetica,Arial,sans-serif";

/** The letter for those who read mail as HTML: without tables, images, scripts or anything fetched. */
export function letterHtml(letter: Letter): string {
  const { subject, name, paragraphs, quote, facts, action, tellsResults, footing } = letter;
  const body = [
    `<h1 style="margin:0 0 16px;font-size:19px;line-height:1.35;color:${COLOUR.ink}">${escaped(subject)}</h1>`,
    ...[...(name === undefined ? [] : [`${name},`]), ...paragraphs].map(paragraph),
    ...(quote === undefined ? [] : [quoted(quote)]),
    ...facts.map(({ label, value }) => {
      return `<p style="margin:0 0 4px"><span style="color:${COLOUR.ink2}">${escaped(label)}:</span> ${escaped(value)}</p>`;
    }),
    button(action),
    ...(tellsResults ? [caution()] : []),
    `<p style="margin:20px 0 0;padding-top:12px;border-top:1px solid ${COLOUR.rule};font-size:13px;color:${COLOUR.ink2}">${escaped(footing)}</p>`,
  ];
  return [
    '<!doctype html>',
    `<html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width"><title>${escaped(subject)}</title></head>`,
    `<body style="margin:0;padding:24px 12px;background:${COLOUR.ground};color:${COLOUR.ink};${FONT};font-size:15px;line-height:1.5">`,
    `<div style="max-width:560px;margin:0 auto;padding:24px;background:${COLOUR.sheet};border:1px solid ${COLOUR.rule};border-top:4px solid ${COLOUR.copper}">`,
    ...body,
    '</div></body></html>',
    '',
  ].join('\n');
}

function paragraph(text: string): string {
  return `<p style="margin:0 0 14px">${escaped(text)}</p>`;
}

function quoted(text: string): string {
  const lines = linesOf(text).map(escaped).join('<br>');
  return `<blockquote style="margin:0 0 14px;padding:4px 0 4px 12px;border-left:3px solid ${COLOUR.copper}">${lines}</blockquote>`;
}

/** With the address in plain sight too: whoever reads it sees where it leads before they follow it. */
function button({ label, url }: Letter['action']): string {
  const style = `display:inline-block;padding:10px 18px;background:${COLOUR.copper};color:${COLOUR.onCopper};text-decoration:none;font-weight:600`;
  return [
    `<p style="margin:18px 0 6px"><a href="${escaped(url)}" style="${style}">${escaped(label)}</a></p>`,
    `<p style="margin:0 0 14px;font-size:13px;color:${COLOUR.ink2};overflow-wrap:anywhere">${escaped(url)}</p>`,
  ].join('\n');
}

function caution(): string {
  return `<p style="margin:14px 0 0;padding:10px 12px;background:${COLOUR.watchWash};color:${COLOUR.watch};font-size:13px">${escaped(CAUTION)}</p>`;
}

const ENTITIES: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

/** Text within an element or a quoted attribute. */
export function escaped(text: string): string {
  return text.replaceAll(/[&<>"']/g, (character) => ENTITIES[character] ?? character);
}
