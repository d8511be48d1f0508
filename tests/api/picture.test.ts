import sharp from 'sharp';
import { beforeAll, describe, expect, it } from 'vitest';
import { type Desk, makeDesk, settled, uploadCsv } from './capture-kit.ts';
import { origin } from './security-kit.ts';

let desk: Desk;
let id: string;

const TITLE = 'Crank <script>alert(1)</script> & "cam"';

beforeAll(async () => {
  desk = await makeDesk();
  const lines = ['Time (s),Crank & <b>'];
  for (let i = 0; i < 5000; i += 1)
    lines.push(`${(i / 10_000).toFixed(4)},${i === 2500 ? 50 : (2 * Math.sin(i / 30)).toFixed(3)}`);
  id = await uploadCsv(desk, lines.join('\n'), { title: TITLE });
  await settled(desk, id);
});

const picture = (query: string) =>
  fetch(`${new URL(origin).origin}/api/v1/captures/${id}/picture${query}`, { headers: desk.headers });

describe('GET /captures/{id}/picture', () => {
  it('draws SVG with title, units, axis and caption, markup escaped, nothing from elsewhere', async () => {
    const answer = await picture('?from=0.1&to=0.4&width=900');
    expect(answer.status).toBe(200);
    expect(answer.headers.get('content-type')).toBe('image/svg+xml');
    expect(answer.headers.get('content-disposition')).toMatch(/^attachment; /);
    const svg = await answer.text();
    expect(svg).toContain('Crank &lt;script&gt;');
    expect(svg).not.toMatch(/<script|<b>|<image|<foreignObject|href=|url\((?!#|data:font)/);
    expect(svg).toMatch(/ V<\/text>|0\.1/);
    expect(svg).toMatch(/0\.1000 to 0\.4000 s of 0\.500 s/);
    expect(svg).toContain('SHA-256');
  });

  it('keeps a spike of one sample: a point of the line stands at its height', async () => {
    const svg = await (await picture('')).text();
    const line = /clip-path="url\(#lane0\)" d="([^"]+)"/.exec(svg)?.[1] ?? '';
    const heights = [...line.matchAll(/[ML][\d.]+ ([\d.]+)/g)].map(([, y]) => Number(y));
    // 50 V is the top of what occurs, a twelfth of the range below the lane's edge; everything else is far lower.
    const sorted = [...heights].sort((a, b) => a - b);
    expect(sorted[1]! - sorted[0]!).toBeGreaterThan(50);
  });

  it('gives PNG of twice the width in both themes, with letters', async () => {
    for (const [theme, dark] of [
      ['paper', false],
      ['dim', true],
    ] as const) {
      const answer = await picture(`?format=png&width=600&theme=${theme}`);
      expect(answer.headers.get('content-type')).toBe('image/png');
      const image = sharp(Buffer.from(await answer.arrayBuffer()));
      expect((await image.metadata()).width).toBe(1200);
      const { data } = await image
        .extract({ left: 0, top: 0, width: 1200, height: 80 })
        .greyscale()
        .raw()
        .toBuffer({ resolveWithObject: true });
      const [lowest, highest] = [Math.min(...data), Math.max(...data)];
      // Ground and letters of the title both stand in the upper strip.
      expect(highest - lowest).toBeGreaterThan(120);
      expect(data[0]! < 128).toBe(dark);
    }
  });

  it.each([
    ['?width=100', 'width'],
    ['?width=1e9', 'width'],
    ['?theme=neon', 'theme'],
    ['?format=gif', 'format'],
    ['?from=5&to=6', 'from'],
    ['?from=0.4&to=0.1', 'from'],
    ['?signals=7', 'signals'],
  ])('refuses %s with the field that is wrong', async (query, path) => {
    const answer = await picture(query);
    expect(answer.status).toBe(422);
    expect((await answer.json()).error.details[0].path).toBe(path);
  });
});
