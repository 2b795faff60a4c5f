// What was drawn in one picture of a report, read back from its SVG in pixels, and the numbers it was made of.

/** Every text and shape of the picture with the middle and size of its box. */
export function read_drawing(page, number) {
  return page.locator(`[data-picture="${number}"]`).evaluate((place) => {
    const box = (element) => {
      const { x, y, width, height } = element.getBoundingClientRect();
      return { x: x + width / 2, y: y + height / 2, width, height };
    };
    const paint = (element) => ({
      fill: element.getAttribute('fill'),
      stroke: element.getAttribute('stroke'),
      width_px: Number(element.getAttribute('stroke-width') ?? 1),
      dash: element.getAttribute('stroke-dasharray') ?? 'solid',
    });
    const all = (selector) => [...place.querySelectorAll(`svg ${selector}`)];
    return {
      texts: all('text').map((element) => ({ text: element.textContent, ...box(element) })),
      shapes: all('path').map((element) => ({ ...paint(element), ...box(element) })),
    };
  });
}

/** The numbers below a picture, a list of cells per row. */
export function read_numbers(page, number) {
  return page.locator(`figure:has([data-picture="${number}"]) + details tbody tr`)
    .evaluateAll((rows) => rows.map((row) => [...row.cells].map((cell) => cell.textContent)));
}

/** The middle of the text `text`; the n-th from the top where there are several. */
export function place_of(drawing, text, n = 0) {
  const found = drawing.texts.filter((one) => one.text === text).sort((a, b) => a.y - b.y)[n];
  if (!found) throw new Error(`no text ${text} in ${drawing.texts.map((one) => one.text).join(' | ')}`);
  return found;
}

/** From value to pixel, through two ticks: [value, pixel] each. */
export function scale_through([value_a, pixel_a], [value_b, pixel_b], shape = (value) => value) {
  const slope = (pixel_b - pixel_a) / (shape(value_b) - shape(value_a));
  return (value) => pixel_a + slope * (shape(value) - shape(value_a));
}

/** Small filled or outlined shapes: the markers of points, in the plot and in the legend. */
export function markers_of(drawing) {
  return drawing.shapes.filter((shape) => shape.fill !== 'none' && shape.width > 3 && shape.width < 16 && Math.abs(shape.width - shape.height) < 4);
}

export function has_at(shapes, x, y, tolerance_px = 1.5) {
  return shapes.some((shape) => Math.abs(shape.x - x) < tolerance_px && Math.abs(shape.y - y) < tolerance_px);
}
