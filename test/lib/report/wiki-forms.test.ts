import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { readCampaign } from '../../../lib/campaign/read.js';
import type { Report } from '../../../lib/report/index.js';
import { textCell, textColumn } from '../../../lib/report/index.js';
import { type WikiForm, wikiText } from '../../../lib/report/wiki-forms.js';

const campaign = readFileSync(new URL('../../data/examples/three-sites.json', import.meta.url), 'utf8');
const report: Report = {
  title: 'A & "B" <c>',
  sentences: ['One < two.'],
  tables: [{ id: 't', title: 'T', columns: [textColumn('site')], rows: [[textCell('x | y')]], notes: [] }],
  conventions: ['mean tide'],
  cautions: [],
  provenance: 'computed by hand on 2026-12-01',
};
const text = (form: WikiForm, more: object = {}) =>
  wikiText(form, {
    campaign,
    report,
    show: ['section', 'links'],
    link: 'rp',
    script: 'files/plumbtick.js',
    address: 'https://example.org/p.html#link=rp&plumb1=1.1.A',
    ...more,
  });

describe('ways into a wiki', () => {
  it('script and elements: the campaign comes out of it as it went in', () => {
    const written = text('script');
    expect(written).toContain('<script src="files/plumbtick.js" defer></script>\n<plumb-campaign link="rp">');
    expect(written).toContain('<plumb-section></plumb-section>\n<plumb-links></plumb-links>');
    const inside = /<script type="application\/json">\n([\s\S]*?)\n<\/script>/.exec(written)![1]!;
    expect(readCampaign(inside)).toEqual(readCampaign(campaign));
  });

  it('nothing in a campaign ends the script early', () => {
    const hostile = '{ "title": "</script><img src=x onerror=alert(1)>" }';
    const written = text('script', { campaign: hostile, link: '"><b' });
    expect(written).not.toContain('<img');
    expect(written).toContain('link="&quot;>&lt;b"');
    const inside = /<script type="application\/json">\n([\s\S]*?)\n<\/script>/.exec(written)![1]!;
    expect(JSON.parse(inside)).toEqual(JSON.parse(hostile));
  });

  it('iframe: sandboxed, the address escaped, the height taken from a number of this frame alone', () => {
    const written = text('iframe');
    expect(written).toContain('title="A &amp; &quot;B&quot; &lt;c>"');
    expect(written).toContain('src="https://example.org/p.html#link=rp&amp;plumb1=1.1.A"');
    expect(written).toContain('sandbox="allow-scripts"');
    expect(written).not.toContain('allow-same-origin');
    expect(written).toContain('e.source === frame.contentWindow && typeof e.data === "number"');
  });

  it('every static form says who computed it', () => {
    for (const form of ['markdown', 'mediawiki', 'html', 'latex'] as const) {
      expect(text(form).replace(/\\/g, ''), form).toContain('computed by hand on 2026-12-01');
      expect(text(form), form).not.toContain('<c>');
    }
  });
});
