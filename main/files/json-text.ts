/** C1 controls, bidirectional marks and line separators, which JSON allows raw but a terminal obeys. */
const RAW_CONTROLS = /[\u007f-\u009f\u061c\u200b-\u200f\u2028-\u202e\u2060-\u206f\ufeff\ufff9-\ufffb]/g;

/** A list of numbers over several lines; a text cannot match, as it holds no raw line break. */
const NUMBER_LIST = /\[\n\s+-?\d[-+.\dEe]*(?:,\n\s+-?\d[-+.\dEe]*)*\n\s+\]/g;

/** JSON with a line end, points on one line each. What a terminal could obey is escaped, so `--json -` is safe to look at. */
export function jsonText(value: unknown): string {
  const text = JSON.stringify(value, null, 2).replace(NUMBER_LIST, (list) =>
    list.replace(/\s+/g, ' ').replace('[ ', '[').replace(' ]', ']'),
  );
  return `${text.replace(RAW_CONTROLS, (character) => `\\u${character.charCodeAt(0).toString(16).padStart(4, '0')}`)}\n`;
}
