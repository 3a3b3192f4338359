import { aTimeout, expect } from '@open-wc/testing';
import { fetchExample } from './example.js';

/** A page of its own under a policy that refuses inline scripts, inline styles, eval, workers and every foreign request.
 *  The built script is used, as a wiki would; `npm test` builds before this runs. */
async function pageUnderPolicy(
  body: string,
  sandbox: string | null = null,
): Promise<{ page: Document; window: Window; refused: string[] }> {
  const frame = document.createElement('iframe');
  frame.width = '700';
  frame.height = '900';
  if (sandbox) frame.setAttribute('sandbox', sandbox);
  const own = location.origin;
  const policy = `default-src 'none'; script-src ${own}; style-src ${own}; connect-src 'none'; require-trusted-types-for 'script'`;
  frame.srcdoc = `<!doctype html><html lang="en"><meta charset="utf-8">
    <meta http-equiv="Content-Security-Policy" content="${policy}"><title>wiki</title><body>${body}
    <script src="${own}/dist/plumbtick.js"></script></body></html>`;
  const refused: string[] = [];
  const attached = new Promise<void>((resolve) => {
    frame.addEventListener('load', () => resolve(), { once: true });
  });
  document.body.append(frame);
  // the document exists before its scripts run: heard from its first millisecond on
  const heard = new WeakSet<Document>();
  const listen = () => {
    const page = frame.contentDocument;
    if (!page || heard.has(page)) return;
    heard.add(page);
    page.addEventListener('securitypolicyviolation', (event) =>
      refused.push(`${event.violatedDirective} ${event.blockedURI}`),
    );
  };
  const timer = setInterval(listen, 1);
  await attached;
  clearInterval(timer);
  listen();
  await aTimeout(100);
  return { page: frame.contentDocument!, window: frame.contentWindow!, refused };
}

describe('under a strict policy', () => {
  afterEach(() => {
    for (const frame of document.querySelectorAll('iframe')) frame.remove();
  });

  it('every element works, and nothing it does is refused', async () => {
    const campaign = (await fetchExample()).replaceAll('<', '\\u003c');
    const { page, refused } = await pageUnderPolicy(`
      <plumb-floors dh="12.348(3) m" g="9.8125(1) m/s²"></plumb-floors>
      <plumb-pair a-lat="58.9712" a-lon="5.7305" a-h="51.3370(60) m" a-zeta="45.120(15) m"
        b-lat="58.8102" b-lon="6.4421" b-h="912.4402(70) m" b-zeta="45.377(18) m" correlation="0.48"></plumb-pair>
      <plumb-campaign><script type="application/json">${campaign}</script><plumb-links></plumb-links><plumb-budget></plumb-budget></plumb-campaign>`);
    const text = (tag: string, part: string) =>
      page.querySelector(tag)?.shadowRoot?.querySelector(part)?.textContent ?? '';
    expect(text('plumb-floors', '.s1')).to.contain('runs fast by');
    expect(text('plumb-pair', '.s1')).to.contain('9.40281(21)e-14');
    expect(text('plumb-links', '.say')).to.contain('agrees with its prediction');
    expect(text('plumb-budget', '.say')).to.contain('is predicted to');
    // trials run on the page unasked, in slices: no worker is tried
    await aTimeout(1500);
    expect(text('plumb-budget', '.two')).to.contain('The linear result holds');
    // the styles are there too, not only the words
    const sentence = page.querySelector('plumb-floors')!.shadowRoot!.querySelector('.s1')!;
    expect(page.defaultView!.getComputedStyle(sentence).fontSize).to.equal('18px');
    expect(refused).to.deep.equal([]);
  });

  it('the frame does notice what a page must not do', async () => {
    const { page, refused } = await pageUnderPolicy('<p style="color:red">x</p>');
    const one = page.createElement('p');
    one.setAttribute('style', 'color: red');
    page.body.append(one);
    await aTimeout(50);
    expect(refused.join()).to.contain('style-src');
  });
});
