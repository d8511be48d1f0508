import type { DecodedWindow } from '../../../engine/drawing/decode-window.ts';
import { type DegreeScale, degreeScale } from '../../../engine/drawing/degree-scale.ts';
import { digitsFor, fixed, unitText } from '../../../engine/drawing/format.ts';
import { extentOf, lineData } from '../../../engine/drawing/line-data.ts';
import { laneRange, valueTicks } from '../../../engine/drawing/ticks.ts';
import { timeScale } from '../../../engine/drawing/time-scale.ts';
import type { PlotSignal, PlotWheel, View } from '../../../engine/drawing/types.ts';
import { escapeXml } from './escape-xml.ts';
import { PALETTES, type PictureTheme } from './palette.ts';

export interface PictureLane {
  readonly signal: PlotSignal;
  readonly colour: string;
  readonly dash: string | undefined;
}

export interface PictureMark {
  readonly signal: number | null;
  readonly from: number;
  readonly to: number | null;
  readonly value: number | null;
  readonly text: string;
  readonly author: string;
}

export interface PictureInput {
  readonly title: string;
  /** Sentences under the picture: what it shows, from where, how it was drawn. */
  readonly caption: readonly string[];
  readonly lanes: readonly PictureLane[];
  readonly window: DecodedWindow;
  readonly holds: boolean;
  readonly view: View;
  readonly wheel: PlotWheel | null;
  readonly marks: readonly PictureMark[];
  readonly width: number;
  readonly theme: PictureTheme;
  /** Style that names the font, as CSS. */
  readonly fontFace: string;
}

const LEFT = 92;
const RIGHT = 20;
const LANE = 190;
const GAP = 6;
const LETTER = 6.4;

const n = (value: number) => (Number.isFinite(value) ? String(Number(value.toFixed(2))) : '0');

/** A stretch of a capture as a standing picture: title, scale, lanes with units, marks with their words, caption. */
export function pictureSvg(input: PictureInput): { svg: string; width: number; height: number } {
  const { title, lanes, view, wheel, marks, width, theme } = input;
  const palette = PALETTES[theme];
  const plotWidth = width - LEFT - RIGHT;
  const degrees = wheel === null ? null : degreeScale(wheel, view, plotWidth);
  const top = 56 + (degrees === null ? 0 : 46);
  const lanesHeight = lanes.length * (LANE + GAP) - GAP;
  const inView = marks.filter((mark) => (mark.to ?? mark.from) >= view.from && mark.from <= view.to);
  const words = [
    ...inView.map((mark, place) => `${place + 1}  ${mark.text || 'No text'} (${mark.author})`),
    ...input.caption,
  ].flatMap((line) => wrapped(line, Math.floor((width - LEFT - RIGHT) / LETTER)));
  const below = top + lanesHeight + 52;
  const height = below + words.length * 17 + 16;
  const text = (x: number, y: number, words: string, more = '') =>
    `<text x="${n(x)}" y="${n(y)}" ${more}>${escapeXml(words)}</text>`;

  const parts = [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${n(height)}" viewBox="0 0 ${width} ${n(height)}" role="img" aria-label="${escapeXml(title)}">`,
    `<style>${input.fontFace}text{font-family:Archivo,Arial,sans-serif;font-size:12px;fill:${palette.ink}}.b{font-weight:600}.s{fill:${palette.soft}}.a{fill:${palette.accent}}</style>`,
    `<rect width="${width}" height="${n(height)}" fill="${palette.sheet}"/>`,
    text(LEFT, 30, title, `class="b" style="font-size:19px"`),
  ];
  if (degrees !== null) parts.push(degreeBar(degrees, 56, palette, text));
  const scale = timeScale(view, plotWidth);
  lanes.forEach((lane, place) => {
    parts.push(laneSvg(input, lane, top + place * (LANE + GAP), plotWidth, text));
  });
  if (degrees !== null && degrees.marks.length < plotWidth / 8)
    parts.push(
      `<path d="${degrees.marks.map(({ at }) => `M${n(LEFT + at)} ${top}v${n(lanesHeight)}`).join('')}" stroke="${palette.accent}" stroke-dasharray="9 3 2 3" fill="none"/>`,
    );
  const barY = top + lanesHeight + 6;
  for (const { from, to, dark } of scale.fields)
    parts.push(
      `<rect x="${n(LEFT + from)}" y="${barY}" width="${n(to - from)}" height="6" fill="${dark ? palette.ink : 'none'}" stroke="${palette.ink}"/>`,
    );
  for (const { at, text: label } of scale.labels)
    parts.push(
      text(clamp(LEFT + at, LEFT + 10, width - RIGHT - 10), barY + 22, label, 'text-anchor="middle"'),
    );
  inView.forEach((mark, place) => {
    const x = LEFT + clamp(((mark.from - view.from) / (view.to - view.from)) * plotWidth, 0, plotWidth);
    const lane = Math.max(
      lanes.findIndex(({ signal }) => signal.index === mark.signal),
      0,
    );
    const y = top + lane * (LANE + GAP) + 20;
    if (mark.to !== null) {
      const end = LEFT + clamp(((mark.to - view.from) / (view.to - view.from)) * plotWidth, 0, plotWidth);
      parts.push(
        `<rect x="${n(x)}" y="${n(y - 16)}" width="${n(Math.max(end - x, 1))}" height="${LANE - 8}" fill="none" stroke="${palette.accent}" stroke-dasharray="4 3"/>`,
      );
    }
    parts.push(
      `<path d="M${n(x)} ${n(y)}V${n(y + LANE - 26)}" stroke="${palette.accent}" fill="none"/>`,
      `<circle cx="${n(x)}" cy="${n(y)}" r="10" fill="${palette.sheet}" stroke="${palette.accent}" stroke-width="1.25"/>`,
      text(x, y + 4, String(place + 1), 'text-anchor="middle" class="b a"'),
    );
  });
  words.forEach((line, place) => {
    parts.push(text(LEFT, below + place * 17, line, `class="s"`));
  });
  parts.push('</svg>');
  return { svg: parts.join('\n'), width, height };
}

type Text = (x: number, y: number, words: string, more?: string) => string;

function laneSvg(input: PictureInput, lane: PictureLane, top: number, width: number, text: Text): string {
  const palette = PALETTES[input.theme];
  const { signal, colour, dash } = lane;
  const { view, window, holds } = input;
  const extent = extentOf(window, signal, view.from, view.to);
  const { low, high } = laneRange(extent?.lowest ?? Number.NaN, extent?.highest ?? Number.NaN);
  const y = (value: number) => top + ((high - value) / (high - low)) * LANE;
  const x = (timeS: number) => LEFT + ((timeS - view.from) / (view.to - view.from)) * width;
  const { ticks, step } = valueTicks(low, high);
  const unit = unitText(signal.unit);
  const clip = `lane${signal.index}`;
  const parts = [
    `<clipPath id="${clip}"><rect x="${LEFT}" y="${n(top)}" width="${n(width)}" height="${LANE}"/></clipPath>`,
    `<rect x="${LEFT}" y="${n(top)}" width="${n(width)}" height="${LANE}" fill="none" stroke="${palette.rule}"/>`,
  ];
  if (low < 0 && high > 0)
    parts.push(`<path d="M${LEFT} ${n(y(0))}h${n(width)}" stroke="${palette.rule}" fill="none"/>`);
  for (const tick of ticks) {
    const label = Math.abs(tick) >= 1e6 ? tick.toExponential(0) : fixed(tick, digitsFor(step));
    parts.push(
      text(LEFT - 10, y(tick) + 4, unit === '' ? label : `${label} ${unit}`, 'text-anchor="end"'),
      `<path d="M${LEFT - 6} ${n(y(tick))}h6" stroke="${palette.line}" fill="none"/>`,
    );
  }
  parts.push(
    `<path d="M8 ${n(top + 12)}h18" stroke="${colour}" stroke-width="2"${dash === undefined ? '' : ` stroke-dasharray="${dash}"`}/>`,
    text(8, top + 30, signal.name.length > 14 ? `${signal.name.slice(0, 13)}…` : signal.name, 'class="b"'),
    `<path clip-path="url(#${clip})" d="${pathOf(lineData(window, signal, holds), x, y, holds)}" fill="none" stroke="${colour}" stroke-width="1.1" stroke-linejoin="round"${dash === undefined ? '' : ` stroke-dasharray="${dash}"`}/>`,
  );
  return parts.join('\n');
}

/** A hole ends the line; a held value steps. */
function pathOf(
  { xs, ys }: ReturnType<typeof lineData>,
  x: (timeS: number) => number,
  y: (value: number) => number,
  holds: boolean,
): string {
  const parts: string[] = [];
  let pen = false;
  ys.forEach((value, i) => {
    if (value === null) {
      pen = false;
      return;
    }
    const at = n(x(xs[i]!));
    if (pen && holds) parts.push(`H${at}V${n(y(value))}`);
    else parts.push(`${pen ? 'L' : 'M'}${at} ${n(y(value))}`);
    pen = true;
  });
  return parts.join('');
}

function degreeBar(
  scale: DegreeScale,
  top: number,
  palette: { ink: string; accent: string },
  text: Text,
): string {
  const parts = [text(LEFT - 10, top + 12, 'crank', 'text-anchor="end" class="s"')];
  for (const { at, text: label, reference } of scale.degrees)
    parts.push(text(LEFT + at, top + 12, label, `text-anchor="middle"${reference ? ' class="b a"' : ''}`));
  for (const { from, to, dark } of scale.fields)
    parts.push(
      `<rect x="${n(LEFT + from)}" y="${top + 18}" width="${n(to - from)}" height="6" fill="${dark ? palette.ink : 'none'}" stroke="${palette.ink}"/>`,
    );
  for (const { at, tooth } of scale.toothNumbers)
    parts.push(text(LEFT + at, top + 38, String(tooth), 'text-anchor="middle" class="s"'));
  return parts.join('\n');
}

const clamp = (value: number, low: number, high: number) => Math.min(Math.max(value, low), high);

/** Lines of at most so many letters, broken between words; a longer word is broken where it must. */
function wrapped(text: string, letters: number): string[] {
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(/\s+/)) {
    for (let rest = word; rest !== ''; rest = rest.slice(letters)) {
      const piece = rest.slice(0, letters);
      if (line !== '' && line.length + 1 + piece.length > letters) {
        lines.push(line);
        line = '';
      }
      line = line === '' ? piece : `${line} ${piece}`;
    }
  }
  return line === '' ? lines : [...lines, line];
}
