// What sets series apart without colour: marker, dash and a name in the legend. The colours differ in lightness
// and keep at least 3:1 to the paper.
const colours = ['#3b82bd', '#7a2a0c', '#4d9a5f', '#5b2160', '#14181c', '#b98427'];
const dashes = ['solid', [7, 4], [2, 3], [10, 3, 2, 3], [14, 4], [5, 2, 2, 2, 2, 2]];
const symbols = ['circle', 'rect', 'triangle', 'diamond', 'emptyCircle', 'emptyRect'];

// An estimate that errs on the wide side.
export const letterWidth = 8;

export const ink = '#22262b';
export const soft = '#5a6068';
export const faint = '#d5d8dc';
export const font = 'system-ui, "Segoe UI", "DejaVu Sans", sans-serif';

/** After six series the colours come again, with other dashes and markers. */
export function look(index) {
  const round = Math.floor(index / colours.length);
  const at = (list, shift) => list[(index + shift) % list.length];
  return { colour: at(colours, 0), dash: at(dashes, round), symbol: at(symbols, 2 * round) };
}

const raised = '⁰¹²³⁴⁵⁶⁷⁸⁹';

function power_of_ten(exponent) {
  const digits = [...String(Math.abs(exponent))].map((digit) => raised[Number(digit)]).join('');
  return `10${exponent < 0 ? '⁻' : ''}${digits}`;
}

/** A number for people; very large and very small ones with a power of ten. */
export function shown(value, digits = 4, plain = { from: 1e-3, below: 1e5 }) {
  if (value === null || value === undefined || !Number.isFinite(value)) return '-';
  const size = Math.abs(value);
  if (size === 0 || (size >= plain.from && size < plain.below)) return String(Number(value.toPrecision(digits)));
  const [mantissa, exponent] = value.toExponential(digits - 1).split('e').map(Number);
  return mantissa === 1 ? power_of_ten(exponent) : `${mantissa}·${power_of_ten(exponent)}`;
}

/** A name that would not fit into its place, cut. */
export function cut(text, room_px) {
  const letters = Math.floor(room_px / letterWidth);
  return text.length > letters ? `${text.slice(0, letters - 1)}…` : text;
}

/** Names come from scenarios: never let one become markup. */
export function escaped(text) {
  const entities = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' };
  return String(text).replace(/[&<>"']/g, (c) => entities[c]);
}
