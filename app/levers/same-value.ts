/** True when two plain values (numbers, texts, arrays, records; as they come from JSON) hold the same. */
export function isSameValue(one: unknown, other: unknown): boolean {
  if (Object.is(one, other)) return true;
  if (typeof one !== 'object' || typeof other !== 'object' || one === null || other === null) return false;
  if (Array.isArray(one) !== Array.isArray(other)) return false;
  const keys = Object.keys(one);
  if (keys.length !== Object.keys(other).length) return false;
  return keys.every(
    (key) => Object.hasOwn(other, key) && isSameValue(one[key as keyof typeof one], other[key as keyof typeof other]),
  );
}
