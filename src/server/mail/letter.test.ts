import { describe, expect, it } from 'vitest';
import { letter } from './letter.ts';

describe('letter()', () => {
  it('says the same in text and HTML', () => {
    const { text, html } = letter([
      'Hello Ada,',
      { label: 'Open it', link: 'https://gapmark.example/x?key=1' },
    ]);
    expect(text).toBe('Hello Ada,\n\nOpen it:\nhttps://gapmark.example/x?key=1\n');
    expect(html).toContain('<p>Hello Ada,</p>');
    expect(html).toContain('<a href="https://gapmark.example/x?key=1"');
  });

  it('makes no markup of what somebody typed', () => {
    const { text, html } = letter([{ quote: '<img src=x onerror="a()"> & \'b\'\nnext' }]);
    expect(text).toContain('<img src=x onerror="a()">');
    expect(html).not.toContain('<img');
    expect(html).toContain('&lt;img src=x onerror=&quot;a()&quot;&gt; &amp; &#39;b&#39;<br>next');
  });

  it('shows a picture by its id, with words for who does not see it', () => {
    const { text, html } = letter([{ pictureId: 'trace', alternative: 'Crank & cam' }]);
    expect(text).toBe('[Picture: Crank & cam]\n');
    expect(html).toContain('<img src="cid:trace" alt="Crank &amp; cam"');
  });
});
