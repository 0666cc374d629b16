/** One or two letters for a name: "Ada Byron" → "AB". */
export function initialsOf(name: string): string {
  const words = name.trim().split(/\s+/).filter(Boolean);
  const letters = words.length > 1 ? [words[0], words[words.length - 1]] : words;
  return letters.map((word) => Array.from(word ?? '')[0]?.toLocaleUpperCase() ?? '').join('');
}
