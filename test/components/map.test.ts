import { aTimeout, expect, html, nextFrame } from '@open-wc/testing';
import { emulateMedia, sendKeys, sendMouse, setViewport } from '@web/test-runner-commands';
import type { PlumbCampaign } from '../../components/campaign/plumb-campaign.js';
import { clamped, fitted, MapProjection } from '../../components/charts/map-projection.js';
import { outlinePath, readOutline } from '../../components/map/outline.js';
import { OUTLINE } from '../../components/map/outline-data.js';
import type { PlumbMap, PlumbMove } from '../../components/map/plumb-map.js';
import '../../components/campaign/plumb-campaign.define.js';
import '../../components/map/plumb-map.define.js';
import { degToRad } from '../../lib/quantity/radians.js';
import { fetchExample } from './example.js';
import { boxed, button, overflowing, words } from './within.js';

async function shown(text: string, widthPx = 1216, editable = false) {
  const script = document.createElement('script');
  script.type = 'application/json';
  script.textContent = text;
  const campaign = await boxed<PlumbCampaign>(
    html`<plumb-campaign>${script}<plumb-map ?editable=${editable}>fallback</plumb-map></plumb-campaign>`,
    widthPx,
  );
  const map = campaign.querySelector<PlumbMap>('plumb-map')!;
  await settled(map);
  return { campaign, map };
}

async function settled(map: PlumbMap): Promise<void> {
  for (let i = 0; i < 50 && map.coasts.length === 0; i++) await aTimeout(10);
  for (let i = 0; i < 3; i++) await nextFrame();
  await map.updateComplete;
}

const mark = (map: PlumbMap, key: string): SVGGElement =>
  map.shadowRoot!.querySelector<SVGGElement>(`[data-mark="${key}"][role]`)!;
const ring = (map: PlumbMap, id: string): readonly [number, number] => {
  const circle = mark(map, `site ${id}`).querySelector('.s-ring')!;
  return [Number(circle.getAttribute('cx')), Number(circle.getAttribute('cy'))];
};

describe('plumb-map', () => {
  afterEach(async () => {
    await emulateMedia({ media: 'screen' });
    await setViewport({ width: 1280, height: 900 });
  });

  it('says how near the nearest two are, and what that does to the shared error', async () => {
    const { map } = await shown(await fetchExample());
    expect(words(map, '.say')).to.match(
      /^The nearest two, harbour and ridge, lie 45 km apart, within the reach of the quasigeoid, 60 km\. What they share of its error leaves 17 mm of 23 mm\.$/,
    );
    expect(words(map, '.pairs')).to.contain('harbour, ridge hr 45 km 0.47 17 mm 23 mm');
    expect(words(map, '.by')).to.contain('Computed by Plumbtick');
  });

  it('places sites by latitude and longitude; north is up, and a degree is as long along the meridian as it is', async () => {
    const text = await fetchExample();
    const { map } = await shown(text);
    const places: { id: string; lat: number; lon: number }[] = JSON.parse(text).sites;
    const [a, b, c] = places.map(({ id }) => ring(map, id)) as [
      readonly [number, number],
      readonly [number, number],
      readonly [number, number],
    ];
    const [p, q, r] = places as [(typeof places)[0], (typeof places)[0], (typeof places)[0]];
    const perDegree = (b[1] - a[1]) / (p.lat - q.lat);
    expect(Math.abs((c[1] - b[1]) / (q.lat - r.lat) - perDegree)).to.be.lessThan(0.01);
    const perEast = (c[0] - a[0]) / (r.lon - p.lon);
    const middle = (Math.max(p.lat, q.lat, r.lat) + Math.min(p.lat, q.lat, r.lat)) / 2;
    expect(Math.abs(perEast / perDegree - Math.cos((middle * Math.PI) / 180))).to.be.lessThan(1e-3);
  });

  it('draws a reach as wide as the correlation length', async () => {
    const { map } = await shown(await fetchExample());
    const d = map.shadowRoot!.querySelector('.fig .s-reach')!.getAttribute('d')!;
    const [x = 0, y = 0] = d.slice(1).split(/[L ]/).map(Number);
    const [cx, cy] = ring(map, 'harbour');
    // its first point lies 60 km north: 60 km of a meridian of 111.4 km per degree there
    expect(Math.abs(x - cx)).to.be.lessThan(0.1);
    const perDegree = (ring(map, 'plain')[1] - cy) / (58.9712 - 55.4038);
    expect(Math.abs((cy - y) / perDegree - 60 / 111.38)).to.be.lessThan(0.005);
  });

  it('zooms and moves by keys and buttons, and comes back', async () => {
    const { map } = await shown(await fetchExample());
    const before = ring(map, 'ridge');
    const apart = () => ring(map, 'plain')[1] - ring(map, 'harbour')[1];
    const home = apart();
    map.shadowRoot!.querySelector<SVGSVGElement>('.fig')!.focus();
    await sendKeys({ press: '+' });
    await map.updateComplete;
    expect(Math.abs(apart() / home - 1.5)).to.be.lessThan(0.01);
    await sendKeys({ press: 'ArrowUp' });
    await map.updateComplete;
    const moved = ring(map, 'ridge');
    await sendKeys({ press: 'ArrowDown' });
    await map.updateComplete;
    expect(moved[1]).to.be.greaterThan(ring(map, 'ridge')[1]);
    await sendKeys({ press: '0' });
    await map.updateComplete;
    expect(ring(map, 'ridge')).to.deep.equal(before);
    button(map, 'Farther').click();
    await map.updateComplete;
    expect(Math.abs(apart() / home - 1 / 1.5)).to.be.lessThan(0.01);
    button(map, 'All sites').click();
    await map.updateComplete;
    expect(ring(map, 'ridge')).to.deep.equal(before);
  });

  /** Drags from the ring of plain by (40, −30) px. */
  async function drag(map: PlumbMap): Promise<readonly PlumbMove[]> {
    const moves: PlumbMove[] = [];
    map.addEventListener('plumb-move', (event) => moves.push(event.detail));
    const circle = mark(map, 'site plain').querySelector('.s-ring')!;
    circle.scrollIntoView({ block: 'center' });
    const box = circle.getBoundingClientRect();
    const from: [number, number] = [Math.round(box.left + box.width / 2), Math.round(box.top + box.height / 2)];
    await sendMouse({ type: 'move', position: from });
    await sendMouse({ type: 'down' });
    await sendMouse({ type: 'move', position: [from[0] + 40, from[1] - 30] });
    await sendMouse({ type: 'up' });
    await settled(map);
    return moves;
  }

  it('a site is dragged where editing is allowed; if nobody takes it there it comes back', async () => {
    const { map } = await shown(await fetchExample(), 1216, true);
    const before = ring(map, 'plain');
    const moves = await drag(map);
    expect(moves.map(({ site }) => site)).to.deep.equal(['plain']);
    const perDegree = (before[1] - ring(map, 'harbour')[1]) / (58.9712 - 55.4038);
    expect(Math.abs(moves[0]!.latitude - (55.4038 + 30 / perDegree))).to.be.lessThan(0.02);
    const perEast = perDegree * Math.cos((57.1875 * Math.PI) / 180);
    expect(Math.abs(moves[0]!.longitude - (10.4024 + 40 / perEast))).to.be.lessThan(0.04);
    expect(ring(map, 'plain')).to.deep.equal(before);
  });

  it('a site stays where editing is not allowed; the ground moves the map', async () => {
    const { map } = await shown(await fetchExample());
    const before = ring(map, 'plain');
    expect(await drag(map)).to.deep.equal([]);
    expect(ring(map, 'plain')).to.deep.equal(before);
    const ground = map.shadowRoot!.querySelector('.s-ground-of-map')!.getBoundingClientRect();
    const from: [number, number] = [Math.round(ground.left + 40), Math.round(ground.bottom - 60)];
    await sendMouse({ type: 'move', position: from });
    await sendMouse({ type: 'down' });
    await sendMouse({ type: 'move', position: [from[0] + 50, from[1] - 20] });
    await sendMouse({ type: 'up' });
    await settled(map);
    const after = ring(map, 'plain');
    expect(Math.hypot(after[0] - before[0] - 50, after[1] - before[1] + 20)).to.be.lessThan(0.5);
  });

  it('moves a site by the arrow keys: 1 km, with Shift 10 km', async () => {
    const { map } = await shown(await fetchExample(), 1216, true);
    const moves: PlumbMove[] = [];
    map.addEventListener('plumb-move', (event) => moves.push(event.detail));
    mark(map, 'site plain').focus();
    await sendKeys({ press: 'ArrowUp' });
    await sendKeys({ down: 'Shift' });
    await sendKeys({ press: 'ArrowRight' });
    await sendKeys({ up: 'Shift' });
    expect(moves).to.have.length(2);
    // 1 km of the meridian at 55.4°: 111.34 km per degree; 10 km of the parallel: 63.4 km per degree
    expect(Math.abs(moves[0]!.latitude - 55.4038 - 1 / 111.34)).to.be.lessThan(2e-5);
    expect(Math.abs(moves[1]!.longitude - 10.4024 - 10 / 63.42)).to.be.lessThan(2e-2);
  });

  it('takes a link in hand and speaks every mark', async () => {
    const { map } = await shown(await fetchExample());
    mark(map, 'link rp').dispatchEvent(new MouseEvent('click', { bubbles: true, composed: true }));
    await map.updateComplete;
    expect(mark(map, 'link rp').getAttribute('aria-pressed')).to.equal('true');
    expect(mark(map, 'link rp').getAttribute('aria-label')?.replace(/\s/g, ' ')).to.match(
      /^link rp, r1 to p1, fibre, geodesic 44\d km$/,
    );
    expect(mark(map, 'site ridge').getAttribute('aria-label')).to.match(
      /^site ridge, 58\.\d{4}° north, 6\.\d{4}° east$/,
    );
    mark(map, 'link rp').focus();
    await sendKeys({ press: 'Enter' });
    await map.updateComplete;
    expect(mark(map, 'link rp').getAttribute('aria-pressed')).to.equal('false');
  });

  it('has no number without a place, in any campaign and width', async () => {
    for (const name of ['three-sites', 'other-kinds', 'triangle'])
      for (const width of [1216, 328]) {
        const { map } = await shown(await fetchExample(name), width);
        expect(map.shadowRoot!.innerHTML, `${name} ${width}`).not.to.match(/NaN|Infinity|undefined/);
      }
  }).timeout(30_000);

  it('is accessible light, dark and narrow, and prints without its controls', async () => {
    const { campaign, map } = await shown(await fetchExample());
    await expect(map).to.be.accessible();
    campaign.dataset['theme'] = 'dark';
    await nextFrame();
    await expect(map).to.be.accessible();
    await setViewport({ width: 360, height: 800 });
    const narrow = await shown(await fetchExample(), 328);
    expect(overflowing(narrow.map)).to.deep.equal([]);
    await expect(narrow.map).to.be.accessible();
    await emulateMedia({ media: 'print' });
    expect(getComputedStyle(narrow.map.shadowRoot!.querySelector('.bar')!).display).to.equal('none');
  }).timeout(40_000);
});

describe('the ground of the map', () => {
  const frame = { width: 600, height: 400 };

  it('fits places across the date line without going round the Earth', () => {
    const { view } = fitted(
      [
        { latitude: -40, longitude: 175 },
        { latitude: -35, longitude: -170 },
      ],
      frame,
    );
    expect(Math.abs(Math.abs(view.longitude) - 177.5)).to.be.lessThan(1e-9);
    expect(view.longitude).to.be.lessThan(0);
    expect(view.latitude).to.equal(-37.5);
  });

  it('ends at the poles', () => {
    expect(clamped({ latitude: 89, longitude: 0, pxPerDegree: 10 }, frame).latitude).to.equal(70);
    expect(clamped({ latitude: 10, longitude: 0, pxPerDegree: 1 }, frame)).to.deep.equal({
      latitude: 0,
      longitude: 0,
      pxPerDegree: 400 / 180,
    });
  });

  it('px and degrees are each other’s inverse', () => {
    const projection = new MapProjection({ latitude: 47, longitude: 179, pxPerDegree: 60 }, { ...frame, parallel: 47 });
    const { latitude, longitude } = projection.toDegrees(420, 111);
    const [x, y] = projection.place({ latitudeRad: degToRad(latitude), longitudeRad: degToRad(longitude) });
    expect(Math.hypot(x - 420, y - 111)).to.be.lessThan(1e-9);
  });

  it('the outline lies where capes are known to lie, and jumps nowhere', () => {
    const coasts = readOutline(OUTLINE);
    const nearest = (lat: number, lon: number) =>
      Math.min(
        ...coasts.flatMap(({ degrees }) =>
          Array.from({ length: degrees.length / 2 }, (_, i) =>
            Math.hypot(degrees[2 * i + 1]! - lat, (degrees[2 * i]! - lon) * Math.cos((lat * Math.PI) / 180)),
          ),
        ),
      );
    // Cabo da Roca, Cape Agulhas, Cape Byron, North Cape (common geography); within 0.1°, 11 km
    for (const [lat, lon] of [
      [38.78, -9.5],
      [-34.83, 20.0],
      [-28.64, 153.64],
      [71.17, 25.78],
    ] as const)
      expect(nearest(lat, lon), `${lat} ${lon}`).to.be.lessThan(0.1);
    // the middle of an ocean and of a continent are no coast
    expect(nearest(0, -25)).to.be.greaterThan(3);
    expect(nearest(47, 65)).to.be.greaterThan(3);
    for (const { degrees } of coasts)
      for (let i = 2; i < degrees.length; i += 2) expect(Math.abs(degrees[i]! - degrees[i - 2]!)).to.be.lessThan(12);
  });

  it('draws only what is on the map, and the other side of the date line too', () => {
    const coasts = readOutline(OUTLINE);
    const at = (longitude: number) =>
      outlinePath(
        coasts,
        new MapProjection({ latitude: -41, longitude, pxPerDegree: 40 }, { ...frame, parallel: -41 }),
      );
    expect(at(174)).to.have.length.greaterThan(500);
    expect(at(-186)).to.equal(at(174));
    expect(at(-130)).to.equal('');
  });
});
