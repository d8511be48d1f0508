// @ts-check

/**
 * A tree as XML: arrays repeat their element, null and undefined are left out.
 * @typedef {string | number | boolean | null | undefined | XmlNode | XmlNode[]} XmlValue
 * @typedef {{ [name: string]: XmlValue }} XmlNode
 */

/** @param {string} name @param {XmlNode} content */
export function document(name, content) {
  return `<?xml version="1.0" encoding="UTF-8"?>\n<${name} xmlns="http://s3.amazonaws.com/doc/2006-03-01/">${inner(content)}</${name}>`;
}

/** @param {XmlNode} node @returns {string} */
function inner(node) {
  return Object.entries(node)
    .flatMap(([name, value]) => (Array.isArray(value) ? value : [value]).map((one) => element(name, one)))
    .join('');
}

/** @param {string} name @param {XmlValue} value */
function element(name, value) {
  if (value === null || value === undefined || Array.isArray(value)) return '';
  return `<${name}>${typeof value === 'object' ? inner(value) : escapeXml(String(value))}</${name}>`;
}

/** @param {string} text */
function escapeXml(text) {
  // A carriage return would come back as a line feed, other control characters are not allowed in XML 1.0 at all.
  return text
    .replace(/[&<>"]/g, (c) => ({ '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;' })[c] ?? c)
    .replaceAll('\r', '&#13;');
}

/**
 * The elements of this name, as the text between their tags. Enough for the two flat bodies that S3 clients send.
 * @param {string} xml @param {string} name
 * @returns {string[]}
 */
export function elements(xml, name) {
  return [...xml.matchAll(new RegExp(`<${name}(?:\\s[^>]*)?>([\\s\\S]*?)</${name}>`, 'g'))].map(
    (match) => match[1] ?? '',
  );
}

/** The text of the first element of this name; null when there is none. @param {string} xml @param {string} name */
export function textOf(xml, name) {
  const [text] = elements(xml, name);
  if (text === undefined) return null;
  return text.replace(/&(#x?[0-9a-f]+|amp|lt|gt|quot|apos);/gi, (whole, code) => {
    if (code.startsWith('#x')) return String.fromCodePoint(Number.parseInt(code.slice(2), 16));
    if (code.startsWith('#')) return String.fromCodePoint(Number(code.slice(1)));
    return { amp: '&', lt: '<', gt: '>', quot: '"', apos: "'" }[String(code).toLowerCase()] ?? whole;
  });
}
