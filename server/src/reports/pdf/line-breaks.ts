/** Breaks a text between words, and a word that is wider than the line within itself. Line breaks of the text stay. */
export function linesOf(text: string, width: number, measure: (part: string) => number): string[] {
  return text.split('\n').flatMap((paragraph) => {
    const lines: string[] = [];
    let line = '';
    for (const word of paragraph.split(/[^\S\u00a0]+/u).filter((part) => part !== '')) {
      for (const piece of pieces(word, width, measure)) {
        const longer = line === '' ? piece : `${line} ${piece}`;
        if (line === '' || measure(longer) <= width) line = longer;
        else {
          lines.push(line);
          line = piece;
        }
      }
    }
    return [...lines, line];
  });
}

export function shortened(text: string, width: number, measure: (part: string) => number): string {
  if (measure(text) <= width) return text;
  const characters = Array.from(text);
  let [fits, tooMany] = [0, characters.length];
  while (tooMany - fits > 1) {
    const middle = (fits + tooMany) >> 1;
    if (measure(`${characters.slice(0, middle).join('')}…`) <= width) fits = middle;
    else tooMany = middle;
  }
  return `${characters.slice(0, fits).join('').trimEnd()}…`;
}

function pieces(word: string, width: number, measure: (part: string) => number): string[] {
  if (measure(word) <= width) return [word];
  const found: string[] = [];
  let piece = '';
  for (const character of word) {
    if (piece !== '' && measure(piece + character) > width) {
      found.push(piece);
      piece = '';
    }
    piece += character;
  }
  return piece === '' ? found : [...found, piece];
}
