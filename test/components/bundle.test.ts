import { expect } from '@open-wc/testing';
import { version } from '../../lib/constants/version.js';

describe('the single script', () => {
  // the built file as a page would use it; `npm test` builds before this runs
  it('runs from a classic script tag and carries the version of the package', async () => {
    const script = document.createElement('script');
    script.src = '/dist/plumbtick.js';
    await new Promise((resolve, reject) => {
      script.onload = resolve;
      script.onerror = reject;
      document.head.append(script);
    });
    script.remove();
    const { plumbtick } = window as unknown as { plumbtick: { version: string } };
    expect(plumbtick.version).to.match(/^\d+\.\d+\.\d+/);
    expect(plumbtick.version).to.equal(version);
  });
});

describe('the scripts of the small elements', () => {
  it('hold everything they need', async () => {
    for (const name of ['plumb-floors', 'plumb-pair']) {
      const frame = document.createElement('iframe');
      frame.srcdoc = `<!doctype html><meta charset="utf-8"><script src="/dist/${name}.js"></script>
        <${name} dh="12.348(3) m" g="9.8125(1) m/s²" a-lat="58.9712" a-lon="5.7305" a-h="51.3370(60) m" a-zeta="45.120(15) m"
        b-lat="58.8102" b-lon="6.4421" b-h="912.4402(70) m" b-zeta="45.377(18) m"></${name}>`;
      await new Promise((resolve) => {
        frame.onload = resolve;
        document.body.append(frame);
      });
      const element = frame.contentDocument!.querySelector(name)!;
      expect(element.shadowRoot!.querySelector('.s1')!.textContent).to.match(/runs fast by/);
      frame.remove();
    }
  });
});
