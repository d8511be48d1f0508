import { createHash } from 'node:crypto';
import { escapeXml } from '../../captures/picture/escape-xml.ts';
import type { Block, Report } from './blocks.ts';
import type { TraceFigure } from './trace-figure.ts';

const STYLE = `
:root{color-scheme:light}
body{margin:0 auto;max-width:50rem;padding:1.5rem 1rem 3rem;background:#fcfbf8;color:#20262b;font:1rem/1.5 Archivo,"Helvetica Neue",Arial,sans-serif;overflow-wrap:break-word}
h1{font-size:1.6rem;line-height:1.25;margin:.25rem 0 1rem}
h2{font-size:1.1rem;margin:1.75rem 0 .5rem;padding-bottom:.25rem;border-bottom:1px solid #857e6e}
p{margin:.5rem 0;white-space:pre-line}.kicker,.soft,figcaption{color:#59616a;font-size:.875rem}
.strong{font-size:1.15rem;font-weight:600}
table{width:100%;border-collapse:collapse;margin:.5rem 0;font-size:.9rem}
th,td{padding:.35rem .75rem .35rem 0;border-bottom:1px solid #dad4c6;text-align:left;vertical-align:top;overflow-wrap:anywhere;min-width:4.4rem}
thead th{color:#59616a;font-weight:400}tbody th{font-weight:500}.n{text-align:right;font-variant-numeric:tabular-nums}
.facts th{width:9rem;color:#59616a;font-weight:400}
figure{margin:1rem 0}svg,img{display:block;max-width:100%;height:auto;border:1px solid #dad4c6}img{max-height:24rem;width:auto}
svg text{font-size:10px;fill:#59616a}svg .name{font-weight:600;fill:#20262b}svg .mark{fill:#6b2d5c;font-weight:600}
footer{margin-top:2rem;padding-top:.5rem;border-top:1px solid #857e6e;color:#59616a;font-size:.875rem}
@media print{body{max-width:none;padding:0}h2{break-after:avoid}figure,tr{break-inside:avoid}}
`;

const HASH = `'sha256-${createHash('sha256').update(STYLE).digest('base64')}'`;

/** What a browser may load for it: its own style, our pictures. */
export const REPORT_POLICY = `default-src 'none'; style-src ${HASH}; img-src 'self'; frame-ancestors 'none'; base-uri 'none'; form-action 'none'`;

const e = escapeXml;

/** A report as one HTML page without scripts. */
export function reportHtml(report: Report): string {
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width">
<title>${e(report.title)}</title>
<style>${STYLE}</style>
</head>
<body>
<header>
<p class="kicker">${e(report.kicker)}</p>
<h1>${e(report.title)}</h1>
<p><strong>${e(report.workshop)}</strong></p>
</header>
<main>
<table class="facts"><tbody>
${report.facts.map(([label, value]) => `<tr><th scope="row">${e(label)}</th><td>${e(value)}</td></tr>`).join('\n')}
</tbody></table>
${report.sections.map((section) => `<section><h2>${e(section.heading)}</h2>\n${section.blocks.map(blockHtml).join('\n')}\n</section>`).join('\n')}
</main>
<footer>${e(report.foot)}</footer>
</body>
</html>
`;
}

function blockHtml(block: Block): string {
  switch (block.kind) {
    case 'text':
      return `<p${block.weight === undefined ? '' : ` class="${block.weight}"`}>${e(block.text)}</p>`;
    case 'list':
      return `<ul>${block.items.map((item) => `<li>${e(item)}</li>`).join('')}</ul>`;
    case 'photo': {
      const alt = e(block.caption || 'Photo without a caption');
      return `<figure><img src="/api/v1/photos/${block.id}/image" width="${block.width}" height="${block.height}" alt="${alt}"><figcaption>${alt}</figcaption></figure>`;
    }
    case 'trace':
      return traceHtml(block.figure);
    case 'table': {
      const cell = (place: number) => (block.columns[place]?.number ? ' class="n"' : '');
      const head = block.columns.map(({ title }, place) => `<th scope="col"${cell(place)}>${e(title)}</th>`);
      const rows = block.rows.map(
        (row) =>
          `<tr>${row.map((text, place) => (place === 0 ? `<th scope="row">${e(text)}</th>` : `<td${cell(place)}>${e(text)}</td>`)).join('')}</tr>`,
      );
      return `<table><thead><tr>${head.join('')}</tr></thead><tbody>${rows.join('\n')}</tbody></table>`;
    }
  }
}

function traceHtml(figure: TraceFigure): string {
  const { width, height, left, lanes, times, marks } = figure;
  const parts = lanes.map(
    (lane) =>
      `<rect x="${left}" y="${lane.top}" width="${width - left}" height="${lane.height}" fill="none" stroke="#dad4c6"/>` +
      `<text class="name" x="${left + 4}" y="${lane.top + 11}">${e(lane.name)}</text>` +
      lane.ticks
        .map(({ at, text }) => `<text x="${left - 6}" y="${at + 3}" text-anchor="end">${e(text)}</text>`)
        .join('') +
      `<path d="${lane.path}" fill="none" stroke="${lane.colour}"${lane.dash.length === 0 ? '' : ` stroke-dasharray="${lane.dash.join(' ')}"`}/>`,
  );
  const bottom = height - 16;
  parts.push(
    ...times.map(
      ({ at, text }) => `<text x="${at}" y="${height - 5}" text-anchor="middle">${e(text)}</text>`,
    ),
    ...marks.map(
      ({ at, end, number }) =>
        `<path d="M${at} 12V${bottom}${end === null ? '' : `M${end} 12V${bottom}`}" fill="none" stroke="#6b2d5c" stroke-dasharray="4 3"/>` +
        `<text class="mark" x="${at}" y="10" text-anchor="middle">${number}</text>`,
    ),
  );
  return `<figure><svg viewBox="0 0 ${width} ${height}" width="${width}" height="${height}" role="img" aria-label="${e(figure.alt)}">${parts.join('')}</svg><figcaption>${e(figure.caption)}</figcaption></figure>`;
}
