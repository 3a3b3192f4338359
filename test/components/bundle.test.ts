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
