// What sets series apart without colour: marker, dash and a name in the legend.
export const looks = [
  { colour: '#1d4f76', dash: 'solid', symbol: 'circle' },
  { colour: '#a8540f', dash: [7, 4], symbol: 'rect' },
  { colour: '#3a7046', dash: [2, 3], symbol: 'triangle' },
  { colour: '#6d4680', dash: [10, 3, 2, 3], symbol: 'diamond' },
  { colour: '#4a4f55', dash: [4, 2], symbol: 'emptyCircle' },
  { colour: '#8a2b45', dash: [12, 4], symbol: 'emptyRect' },
];

export const ink = '#22262b';
export const faint = '#c9cdd2';
export const font = 'system-ui, "Segoe UI", "DejaVu Sans", sans-serif';

export function look(index) {
  return looks[index % looks.length];
}

/** A number for people: three significant digits, powers of ten where they are shorter. */
export function shown(value) {
  if (value === null || value === undefined) return '-';
  const size = Math.abs(value);
  if (size !== 0 && (size >= 1e5 || size < 1e-3)) return value.toExponential(1).replace('e+', 'e');
  return String(Number(value.toPrecision(3)));
}
