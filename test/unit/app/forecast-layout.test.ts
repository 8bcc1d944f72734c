/** Ticks whose labels do not touch, and places on an axis. */
import { describe, expect, it } from 'vitest';
import { layOutForecast, placeOn, thinLogTicks, thinTicks } from '@/app/_components/figures/forecast-layout';
import { wrapWords } from '@/app/_components/figures/map-layout';

const years = Array.from({ length: 8 }, (_, index) => ({ value: index * 12, label: String(2020 + index) }));
const percents = [5, 10, 20, 50, 100, 200, 500].map((value) => ({ value: value / 100, label: `${value} %` }));

describe('thinTicks', () => {
  it('keeps all where there is room and every second one on half the width', () => {
    expect(thinTicks(years, [0, 84], 840)).toHaveLength(8);
    expect(thinTicks(years, [0, 84], 280).map((tick) => tick.label)).toEqual([
      '2020',
      '2022',
      '2024',
      '2026',
    ]);
  });
});

describe('thinLogTicks', () => {
  it.each([120, 200, 300, 600])('keeps 100 % and leaves no two labels touching on %i pixels', (width) => {
    const kept = thinLogTicks(percents, [0.05, 5], width);
    expect(kept.map((tick) => tick.label)).toContain('100 %');
    const places = kept.map((tick) => (Math.log(tick.value / 0.05) / Math.log(100)) * width);
    // the widest label, "100 %", takes 5 letters of 7.2 pixels
    for (let index = 1; index < places.length; index++)
      expect(places[index]! - places[index - 1]!).toBeGreaterThan(36);
  });
});

describe('layOutForecast', () => {
  it('gives a phone nearly the whole width and a desk room for the names', () => {
    const phone = layOutForecast({ width: 358, height: 340 }, ['400k'], ['Quillfern', 'Marrowby']);
    const desk = layOutForecast({ width: 940, height: 400 }, ['400k'], ['Quillfern', 'Marrowby']);
    expect(phone.isNarrow).toBe(true);
    expect(phone.right).toBeLessThan(10);
    expect(desk.isNarrow).toBe(false);
    expect(desk.right).toBeGreaterThan(60);
    expect(desk.plot.x + desk.plot.width + desk.right).toBe(940);
  });
});

describe('placeOn', () => {
  it('puts the ends of a domain on the ends of the axis, upright ones too', () => {
    expect(placeOn([0, 10], 0, 200, 10)).toBe(200);
    expect(placeOn([0, 10], 200, 0, 0)).toBe(200);
    expect(placeOn([-5, 5], 0, 100, 0)).toBe(50);
  });
});

describe('wrapWords', () => {
  it('breaks between words only and loses none', () => {
    const lines = wrapWords('head start decides', 80);
    expect(lines.length).toBeGreaterThan(1);
    expect(lines.join(' ')).toBe('head start decides');
  });
});
