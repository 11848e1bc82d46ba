/**
 * First letters of the first and the last name, in the order given; who would share them with someone before gets a number:
 * "AR", "AR2".
 */
export function initialsOf(names: readonly string[]): string[] {
  const taken = new Set<string>();
  return names.map((name) => {
    const words = name.split(/\s+/).filter((word) => word !== '');
    const letters = [words[0], words.length > 1 ? words.at(-1) : undefined].map((word) => [...(word ?? '')][0] ?? '');
    const plain = letters.join('').toUpperCase();
    let initials = plain;
    for (let count = 2; taken.has(initials); count += 1) initials = `${plain}${String(count)}`;
    taken.add(initials);
    return initials;
  });
}
