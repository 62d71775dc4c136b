/**
 * Labels made unique: a blank one becomes "channel k" (k from 1), and labels that occur more than once are numbered in
 * order ("EGG 1", "EGG 2"), past numbers that are taken.
 */
export function uniqueLabels(labels: readonly string[]): readonly string[] {
  const filled = labels.map((label, index) => label.trim() || `channel ${index + 1}`);
  const counts = new Map<string, number>();
  for (const label of filled) counts.set(label, (counts.get(label) ?? 0) + 1);
  const taken = new Set(filled.filter((label) => counts.get(label) === 1));
  const numbers = new Map<string, number>();
  return filled.map((label) => {
    if (counts.get(label) === 1) return label;
    let number = (numbers.get(label) ?? 0) + 1;
    while (taken.has(`${label} ${number}`)) number += 1;
    numbers.set(label, number);
    taken.add(`${label} ${number}`);
    return `${label} ${number}`;
  });
}
