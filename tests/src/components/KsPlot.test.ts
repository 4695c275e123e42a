import { mount } from '@vue/test-utils';
import { describe, expect, it } from 'vitest';
import KsPlot from '../../../src/components/KsPlot.vue';

const mounted = () =>
  mount(KsPlot, {
    props: {
      title: 'Phase margin, °',
      figure: 6,
      x: { label: 'delay', unit: 'updates' },
      y: { label: 'margin', zero: true },
      series: [
        { label: 'acquire', tone: 'acquire', points: [[0, 65], [3, 62.6], [10, 57]] }, // prettier-ignore
        { label: 'track', tone: 'track', points: [[0, 65.5], [10, 64]] }, // prettier-ignore
      ],
      limits: [{ at: 45, label: 'limit 45' }],
    },
    slots: { default: 'At delay 3 the margin is 62.6°.' },
  });

describe('KsPlot', () => {
  it('reads values along the curves with the arrow keys, in the title line', async () => {
    const plot = mounted();
    const box = plot.get('.plot-box');
    const title = () => plot.get('svg.plot > text').text();
    expect(title()).toBe('Phase margin, °');
    await box.trigger('keydown', { key: 'Home' });
    await box.trigger('keydown', { key: 'ArrowRight' });
    // Track at 3 lies on the straight line between its points: 65.5 − 1.5·3/10 = 65.05.
    expect(plot.get('[aria-live]').text()).toBe('delay, updates 3, acquire 62.6, track 65.05');
    expect(title()).toContain('62.6');
    await box.trigger('keydown', { key: 'End' });
    expect(plot.get('[aria-live]').text()).toBe('delay, updates 10, acquire 57, track 64');
    await box.trigger('keydown', { key: 'Escape' });
    expect(title()).toBe('Phase margin, °');
  });

  it('shows the same data as a table on demand', async () => {
    const plot = mounted();
    expect(plot.find('table').exists()).toBe(false);
    const [toggle] = plot.findAll('figcaption button');
    expect(toggle!.text()).toBe('Table of figure 6');
    await toggle!.trigger('click');
    expect(toggle!.attributes('aria-expanded')).toBe('true');
    const rows = plot.findAll('tbody tr').map((row) => row.findAll('td').map((cell) => cell.text()));
    expect(rows).toEqual([['0', '65', '65.5'], ['3', '62.6', ''], ['10', '57', '64']]); // prettier-ignore
  });

  it('labels its curves directly and names its limit', () => {
    const labels = mounted()
      .findAll('text.halo')
      .map((label) => label.text());
    expect(labels).toEqual(['limit 45', 'acquire', 'track']);
  });
});
