import { describe, expect, it } from 'vitest';
import { dividedViews, sectionPlacement } from '../../../src/web/section/placement.js';
import { drawnWidth } from '../../../src/web/section/label-placement.js';
import { sectionSvg } from '../../../src/web/section/section-drawing.js';
import { momentKey, chosenMoment, momentView } from '../../../src/web/section/moment-view.js';
import { phoneRoom } from '../../../src/web/section/placement.js';
import { sectionWords } from '../../../src/web/section/section-words.js';
import { spacesInUse } from '../../../src/web/section/spaces-in-use.js';
import { sectionText } from '../../../src/web/section/section-text.js';
import { assessmentFixture, momentsFixture } from '../../support/assessment-fixture.js';
import { classroomView, longView, theatreView, vanView } from '../../support/section-fixture.js';

const views = {
  theatre: theatreView,
  classroom: classroomView,
  van: vanView,
  corridor: longView(25),
};

describe('sectionPlacement', () => {
  it.each(Object.entries(views))(
    'draws the %s to one scale, each space as long as it says',
    (_name, view) => {
      const placement = sectionPlacement(view);
      for (const { space, width } of placement.spaces) {
        expect(width / placement.scale).toBeCloseTo(space.lengthM, 6);
      }
      expect(placement.spaces).toHaveLength(view.spaces.length);
    },
  );

  it('puts the pit under the hall it opens into and the space under the stage below the stage', () => {
    const under = new Map(
      sectionPlacement(theatreView).spaces.map((placed) => [placed.space.id, placed.under]),
    );
    expect(Object.fromEntries(under)).toEqual({
      stage: null,
      hall: null,
      pit: 'hall',
      understage: 'stage',
    });
  });

  it('keeps neighbours side by side without overlap in every row', () => {
    for (const view of Object.values(views)) {
      const standing = sectionPlacement(view).spaces.filter((placed) => placed.under === null);
      standing.forEach((placed, index) => {
        const next = standing[index + 1];
        if (next?.row !== placed.row) return;
        expect(next.x).toBeGreaterThanOrEqual(placed.x + placed.width - 0.001);
      });
    }
  });
});

describe('dividedViews', () => {
  it('gives every space and zone of a long venue to exactly one drawing', () => {
    const parts = dividedViews(longView(40), 3);
    expect(parts.length).toBeGreaterThan(1);
    expect(parts.flatMap((part) => part.spaces.map((space) => space.id))).toEqual(
      longView(40).spaces.map((space) => space.id),
    );
    expect(parts.flatMap((part) => part.zones)).toHaveLength(40);
  });
});

describe('sectionSvg', () => {
  it.each(Object.entries(views))(
    'writes the lowest oxygen of every zone of the %s',
    (_name, view) => {
      const { svg } = sectionSvg(view);
      const written = svg.replace(/aria-label="[^"]*"/, '').replaceAll('\u00a0', ' ');
      for (const zone of view.zones) {
        const oxygen =
          zone.lowestOxygen === null
            ? 'no number'
            : `${(Math.floor(zone.lowestOxygen.value * 1000 + 1e-6) / 10).toFixed(1)} %`;
        expect(written).toContain(oxygen);
      }
    },
  );

  it.each(Object.entries(views))(
    'keeps every text and line of the %s inside the drawing',
    (_name, view) => {
      const { svg, width, height } = sectionSvg(view);
      for (const [, x = '', y = ''] of svg.matchAll(/<text x="([-\d.]+)" y="([-\d.]+)"/g)) {
        expect(Number(x)).toBeGreaterThanOrEqual(0);
        expect(Number(x)).toBeLessThanOrEqual(width);
        expect(Number(y)).toBeGreaterThan(0);
        expect(Number(y)).toBeLessThanOrEqual(height);
      }
    },
  );

  it('needs no style attribute and no colour to tell gas positions apart', () => {
    const { svg } = sectionSvg(theatreView);
    expect(svg).not.toContain('style=');
    expect(svg).not.toMatch(/<(linear|radial)Gradient/);
    expect(svg).toContain('gas along the floor');
    expect(svg).toContain('gas under the ceiling');
    expect(svg).toContain('gas mixed through the space');
  });

  it('writes no number over another in a low room beside a tall one', () => {
    const [zone] = classroomView.zones;
    if (zone === undefined) throw new Error('the fixture has lost its zones');
    const { svg } = sectionSvg({
      ...classroomView,
      spaces: [
        { id: 'tower', title: 'Tower', floorLevelM: 0, floorRiseM: 0, heightM: 40, lengthM: 60 },
        { id: 'room', title: 'Gallery', floorLevelM: 0, floorRiseM: 0, heightM: 5, lengthM: 18 },
      ],
      openings: [],
      zones: [0.5, 1, 1.55].map((levelM, i) => ({ ...zone, id: String(i), levelM })),
      layers: [],
    });
    const written = [
      ...svg.matchAll(
        /<text x="([\d.]+)" y="([\d.]+)"[^>]*font-weight="bold"[^>]*text-anchor="end"[^>]*>([^<]*)</g,
      ),
    ];
    expect(written).toHaveLength(3);
    const places = written.map(([, x = '', y = '', text = '']) => ({
      left: Number(x) - drawnWidth(text, 11),
      right: Number(x),
      y: Number(y),
    }));
    for (const [i, one] of places.entries()) {
      for (const other of places.slice(i + 1)) {
        const isApart =
          one.right <= other.left || other.right <= one.left || Math.abs(one.y - other.y) >= 11;
        expect(isApart).toBe(true);
      }
    }
  });

  it('escapes what people typed', () => {
    const [first] = classroomView.spaces;
    if (first === undefined) throw new Error('the fixture has lost its space');
    const { svg } = sectionSvg({ ...classroomView, spaces: [{ ...first, title: 'A <b> & "c"' }] });
    expect(svg).toContain('A &lt;b> &amp; ');
    expect(svg).not.toContain('<b>');
  });

  it('says so when there is nothing to draw', () => {
    const empty = { spaces: [], openings: [], zones: [], layers: [], moment: '' };
    expect(sectionSvg(empty).svg).toContain('No spaces have been entered yet.');
    expect(sectionText(empty)).toBe('No spaces have been entered yet.');
  });
});

describe('sectionText', () => {
  it('names every space, every zone with its number, every layer and the moment', () => {
    const text = sectionText(theatreView).replaceAll('\u00a0', ' ');
    expect(text).toContain('Shown at 19:42, end of the bench fog.');
    expect(text).toContain('Orchestra pit: 4.50 m long, floor at −2.10 m, ceiling at 0.00 m.');
    expect(text).toContain(
      'Players, breathing at −0.95 m: lowest oxygen 17.8 %, highest gas 14.6 %.',
    );
    expect(text).toContain('Trap crew, breathing at −0.50 m: no number.');
    expect(text).toContain('Gas along the floor, 1.40 m deep: 14.6 %.');
    expect(text).toContain('Opening from Hall to outside');
  });
});

describe('the section at a moment', () => {
  const { section } = assessmentFixture;
  const drawn = (index: number, room?: typeof phoneRoom) => {
    const moment = momentsFixture[index];
    if (moment === undefined) throw new Error('the fixture has lost a moment');
    const view = momentView(section, moment, sectionWords);
    return sectionSvg(view, room === undefined ? {} : { room });
  };
  const wordsOf = (svg: string) => svg.replace(/aria-label="[^"]*"/, '').replaceAll('\u00a0', ' ');

  it('writes depth and fraction of the layers of that moment, and none before the gas is out', () => {
    expect(wordsOf(drawn(1).svg)).toContain('9.0 %, 0.90 m deep');
    expect(wordsOf(drawn(3).svg)).toContain('9.0 %, 1.90 m deep');
    expect(wordsOf(drawn(0).svg)).not.toContain('deep');
  });

  it('writes what is breathed then with its bound, rounded down', () => {
    expect(wordsOf(drawn(1).svg)).toMatch(/20\.4 %( \(bound 17\.8 %\))?/);
    expect(wordsOf(drawn(1).svg)).not.toContain('17.9 %');
  });

  it('hangs every meter at its height and names it in the key', () => {
    const svg = wordsOf(drawn(1).svg);
    expect(svg).toContain('Meter: Pit oxygen, −1.80 m');
    expect(svg).toContain('Meter: Stage oxygen, +2.40 m');
    expect(svg.match(/>M[12]</g)).toHaveLength(4);
  });

  it('fits the width of a phone, key included', () => {
    const { svg, width } = drawn(1, phoneRoom);
    expect(width).toBe(340);
    for (const [, x = ''] of svg.matchAll(/<text x="([-\d.]+)"/g)) {
      expect(Number(x)).toBeLessThanOrEqual(340);
    }
  });

  it('is chosen by its name, and is the worst planned one where the name is unknown', () => {
    for (const moment of momentsFixture) {
      expect(chosenMoment(section, momentKey(moment))).toBe(moment);
    }
    expect(chosenMoment(section, 'planned-7')?.title).toBe('when the planned day is at its worst');
    expect(chosenMoment({ ...section, moments: [] }, undefined)).toBeNull();
  });

  it('leaves out spaces where nobody is and no gas comes, and names them', () => {
    const empty = {
      id: 'attic',
      title: 'Attic',
      floorLevelM: 9,
      floorRiseM: 0,
      heightM: 2,
      lengthM: 5,
    };
    const { view, leftOut } = spacesInUse(
      { ...section, spaces: [...section.spaces, empty] },
      assessmentFixture.acts,
      section.moments,
    );
    expect(leftOut).toEqual(['Attic']);
    expect(view.spaces).toHaveLength(section.spaces.length);
  });
});
