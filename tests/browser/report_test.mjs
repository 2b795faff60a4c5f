// Opens reports in a browser: what is drawn, in silence, on paper, on a narrow screen, without scripting.
import assert from 'node:assert/strict';
import { execFileSync } from 'node:child_process';
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { after, before, test } from 'node:test';
import { pathToFileURL } from 'node:url';

import { start_browser } from './browser.mjs';
import { has_at, markers_of, place_of, read_drawing, read_numbers, scale_through } from './drawing.mjs';

const pictures = process.env.PICTURES;
const charts = { efficiency: 0, rate: 1, margins: 2 };
const trace = 3;
const paper = { mm_per_inch: 25.4, px_per_inch: 96, content_mm: 210 - 2 * 16 };
const paper_width_px = paper.content_mm / paper.mm_per_inch * paper.px_per_inch;

let browser;
let reports;
let read_only; // a page for the tests that change nothing

before(async () => {
  reports = mkdtempSync(join(tmpdir(), 'cistern-reports-'));
  mkdirSync(pictures, { recursive: true });
  execFileSync(process.env.REPORT_EXAMPLE, [reports]);
  browser = await start_browser();
  read_only = (await open('plain')).page;
});

after(async () => {
  await browser?.close();
  rmSync(reports, { recursive: true, force: true });
});

// A report in a page of its own; `faults` gathers what must not happen.
async function open(name, { width = 1100, scripting = true } = {}) {
  const context = await browser.newContext({ viewport: { width, height: 900 }, javaScriptEnabled: scripting });
  const page = await context.newPage();
  const faults = [];
  const address = pathToFileURL(join(reports, `${name}.html`)).href;
  page.on('console', (message) => faults.push(`console: ${message.text()}`));
  page.on('pageerror', (error) => faults.push(`error: ${error.message}`));
  page.on('dialog', (dialog) => { faults.push(`dialog: ${dialog.message()}`); dialog.dismiss(); });
  page.on('request', (request) => { if (request.url() !== address && !request.url().startsWith('data:')) faults.push(`request: ${request.url()}`); });
  await page.goto(address);
  return { page, faults };
}

const picture = (page, name) => page.screenshot({ path: join(pictures, `${name}.png`), fullPage: true });

const log10 = (value) => Math.log10(value);

// Every row of the numbers has its marker where the axes say, and there is no other marker.
async function check_points(page, number, { x_ticks, y_ticks, x_shape, y_shape }) {
  const drawing = await read_drawing(page, number);
  const x_of = scale_through(...x_ticks.map((tick) => [tick, place_of(drawing, String(tick), -1 + drawing.texts.filter((t) => t.text === String(tick)).length).x]), x_shape);
  const y_of = scale_through(...y_ticks.map((tick) => [tick, place_of(drawing, String(tick)).y]), y_shape);
  const rows = await read_numbers(page, number);
  const points = rows.map(([, x, y]) => [Number(x), Number(y)]).filter(([, y]) => y_shape !== log10 || y > 0);
  const markers = markers_of(drawing);
  for (const [x, y] of points) assert.ok(has_at(markers, x_of(x), y_of(y)), `no marker at ${x}, ${y}`);
  const series = new Set(rows.map(([name]) => name)).size;
  assert.equal(markers.length, points.length + series, 'one marker a point and one a name in the legend');
}

// What the tooltip says when the mouse stands on the place that `find` picks from the drawing.
async function text_of_tip(page, number, find) {
  await page.locator(`[data-picture="${number}"]`).evaluate((place) => place.scrollIntoView({ block: 'center' }));
  const { x, y } = find(await read_drawing(page, number));
  await page.mouse.move(x, y);
  const tip = page.locator(`[data-picture="${number}"] > div:nth-child(2)`);
  await tip.waitFor({ state: 'visible', timeout: 10000 });
  return tip.innerText();
}

test('a report opens without a fault and asks nobody for anything', async () => {
  const { page, faults } = await open('plain');
  await picture(page, 'screen');
  assert.deepEqual(faults, []);
  await page.context().close();
});

test('every picture is drawn, with the names of its series', async () => {
  const places = read_only.locator('[data-picture]');
  assert.equal(await places.count(), 4);
  const names = [
    ['station in service', 'station with the candidate', 'tall', 'broad'],
    ['tall (slope -7.0 ± 0.2)', 'broad (slope -9.0 ± 0.3)', 'level in use', 'budget'],
    ['tall', 'expected', 'by hand', 'fires'],
    ['channel 0', 'channel 3', 'onset', 'window', 'long fires', 'level 224', 'level 239'],
  ];
  for (const [number, wanted] of names.entries()) {
    const drawing = await read_drawing(read_only, number);
    for (const name of wanted) assert.ok(drawing.texts.some((one) => one.text === name), `${name} in picture ${number}`);
  }
});

test('points lie where the axes say', async () => {
  await check_points(read_only, charts.efficiency, { x_ticks: [0.5, 5], x_shape: log10, y_ticks: [0.2, 0.8] });
  await check_points(read_only, charts.rate, { x_ticks: [0.5, 2.5], y_ticks: [10, 1000], y_shape: log10 });
});

test('a limit hangs where nothing was seen', async () => {
  const drawing = await read_drawing(read_only, charts.rate);
  const x = place_of(drawing, '2.5').x;
  const y_of = scale_through([10, place_of(drawing, '10').y], [1000, place_of(drawing, '1000').y], log10);
  const caps = drawing.shapes.filter((shape) => shape.height < 3 && Math.abs(shape.width - 8) < 3);
  assert.ok(has_at(caps, x, y_of(0.012)), 'a cap at the upper limit');
});

test('a low limit far below all values does not stretch the axis', async () => {
  const drawing = await read_drawing(read_only, charts.rate);
  assert.ok(drawing.texts.some((one) => one.text === '10⁻³'));
  assert.ok(!drawing.texts.some((one) => ['10⁻⁴', '10⁻⁵', '10⁻⁶', '10⁻⁷'].includes(one.text)));
});

test('series differ without colour', async () => {
  const { page } = await open('plain');
  const drawing = await read_drawing(page, charts.efficiency);
  const lines = drawing.shapes.filter((shape) => shape.fill === 'none' && shape.width_px >= 1.5 && shape.width > 300);
  assert.equal(lines.length, 4);
  assert.equal(new Set(lines.map((shape) => shape.dash)).size, 4, 'a dash for each');
  await page.addStyleTag({ content: 'html { filter: grayscale(1); }' });
  await picture(page, 'grey');
  await page.context().close();
});

test('the trace shows firing, onset and level where they are', async () => {
  const drawing = await read_drawing(read_only, trace);
  const x_of = scale_through([500, place_of(drawing, '500').x], [1500, place_of(drawing, '1,500').x]);
  const uprights = drawing.shapes.filter((shape) => shape.width < 4 && shape.height > 80 && shape.height < 110);
  const at = (ns) => uprights.filter((shape) => Math.abs(shape.x - x_of(ns)) < 1.5);
  assert.equal(at(820).filter((shape) => shape.width_px === 2).length, 4, 'sample 1082 fires, in each channel');
  assert.equal(at(610).filter((shape) => shape.dash !== 'solid').length, 4, 'onset at sample 1061');
  const y_of = scale_through([200, place_of(drawing, '200').y], [280, place_of(drawing, '280').y]);
  const level = drawing.shapes.filter((shape) => shape.height < 4 && shape.width > 500 && shape.dash === '7,4');
  assert.equal(level.length, 4);
  assert.ok(level.some((shape) => Math.abs(shape.y - y_of(224)) < 1.5), 'level 224 of channel 0');
});

test('a point tells its numbers', async () => {
  const { page } = await open('plain');
  const row = (await read_numbers(page, charts.efficiency)).find(([name, x]) => name === 'station with the candidate' && x === '1');
  const said = await text_of_tip(page, charts.efficiency, (drawing) => {
    const y_of = scale_through([0.2, place_of(drawing, '0.2').y], [0.8, place_of(drawing, '0.8').y]);
    return { x: place_of(drawing, '1', 1).x, y: y_of(Number(row[2])) };
  });
  for (const part of ['station with the candidate', 'true size (VEM): 1', `efficiency: ${row[2]} (${row[3]} to ${row[4]})`]) assert.ok(said.includes(part), `${part} in ${said}`);
  await page.context().close();
});

test('no text becomes markup', async () => {
  const { page, faults } = await open('hostile');
  const title = await page.title();
  assert.match(await text_of_tip(page, 0, (drawing) => markers_of(drawing)[0]), /<img src=x onerror/);
  await picture(page, 'hostile');
  assert.equal(await page.locator('img').count(), 0);
  assert.equal(await page.title(), title);
  assert.ok(title.startsWith('</script><img'), title);
  assert.deepEqual(faults, []);
  await page.context().close();
});

test('without scripting the verdict, all tables and all numbers can be read', async () => {
  const { page, faults } = await open('plain', { scripting: false });
  await picture(page, 'without-scripting');
  const seen = await page.locator('body').innerText();
  for (const part of ['Not met: 1 of 3', '✓ met', '✗ not met', '? undecided', 'The picture needs scripting', 'Trigger long fires']) assert.ok(seen.includes(part), part);
  for (const number of [0, 1, 2, trace]) {
    const folded = page.locator(`figure:has([data-picture="${number}"]) + details`);
    await folded.locator('summary').click();
    assert.ok(await folded.locator('tbody tr').first().isVisible(), `numbers of picture ${number}`);
  }
  assert.deepEqual(faults, []);
  await page.context().close();
});

test('a narrow window needs no sideways scrolling and keeps its letters legible', async () => {
  const { page } = await open('plain', { width: 390 });
  await picture(page, 'narrow');
  assert.ok(await page.evaluate(() => document.documentElement.scrollWidth <= window.innerWidth));
  const drawing = await read_drawing(page, charts.efficiency);
  assert.ok(place_of(drawing, 'true size (VEM)').height > 10);
  await page.context().close();
});

test('a window that grows gets a wider drawing', async () => {
  const { page } = await open('plain', { width: 500 });
  const width = () => page.locator('[data-picture="0"] svg').evaluate((svg) => svg.getBoundingClientRect().width);
  const narrow = await width();
  await page.setViewportSize({ width: 1200, height: 900 });
  await page.waitForFunction((before) => document.querySelector('[data-picture="0"] svg').getBoundingClientRect().width > before + 100, narrow);
  assert.equal(await width(), 920);
  await page.context().close();
});

test('it prints on A4, every drawing whole and within the page', async () => {
  const { page, faults } = await open('plain');
  const pdf = (await page.pdf({ preferCSSPageSize: true })).toString('latin1');
  writeFileSync(join(pictures, 'print.pdf'), pdf, 'latin1');
  const sizes = [...pdf.matchAll(/\/MediaBox\s*\[0 0 ([\d.]+) ([\d.]+)\]/g)].map(([, width, height]) => [Math.round(width), Math.round(height)]);
  assert.ok(sizes.length >= 2 && sizes.length <= 5, `${sizes.length} pages`);
  for (const size of sizes) assert.deepEqual(size, [595, 842]);
  await page.setViewportSize({ width: Math.floor(paper_width_px), height: 900 });
  await page.emulateMedia({ media: 'print' });
  await page.evaluate(() => window.dispatchEvent(new Event('beforeprint')));
  await picture(page, 'print');
  assert.ok(await page.evaluate(() => document.documentElement.scrollWidth <= window.innerWidth));
  assert.equal(await page.locator('nav').isVisible(), false);
  for (const figure of await page.locator('figure').all()) assert.equal(await figure.evaluate((one) => getComputedStyle(one).breakInside), 'avoid');
  for (const svg of await page.locator('svg').all()) assert.ok((await svg.boundingBox()).width <= paper_width_px);
  assert.deepEqual(faults, []);
  await page.context().close();
});

test('headings, tables and pictures have names for those who hear the page', async () => {
  const bare = await read_only.evaluate(() => {
    const faults = [];
    if (document.querySelectorAll('h1').length !== 1) faults.push('h1');
    document.querySelectorAll('table').forEach((table) => { if (!table.caption?.textContent) faults.push('table without caption'); });
    document.querySelectorAll('th').forEach((cell) => { if (cell.scope !== 'col') faults.push('header without scope'); });
    document.querySelectorAll('[data-picture]').forEach((place) => { if (place.getAttribute('role') !== 'img' || !place.getAttribute('aria-label')) faults.push('picture without name'); });
    document.querySelectorAll('nav a').forEach((link) => { if (!document.getElementById(link.hash.slice(1))) faults.push(`link to nowhere: ${link.hash}`); });
    return faults;
  });
  assert.deepEqual(bare, []);
});
