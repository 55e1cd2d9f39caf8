import { describe, expect, it } from 'vitest';
import { positionSpread } from '../../../src/science/room-air/position-spread.js';

describe('how far readings of one moment lie apart', () => {
  it('is the largest difference over the mean excess, 10 percent for 950 and 1050 above 0', () => {
    // (1050 - 950)/1000, by hand.
    expect(positionSpread([[950], [1050]], 0)).toBeCloseTo(0.1, 12);
    expect(positionSpread([[1370], [1470]], 420)).toBeCloseTo(0.1, 12);
  });

  it('is 0 for one position and for a mixed room', () => {
    expect(positionSpread([[900, 800]], 420)).toBe(0);
    expect(
      positionSpread(
        [
          [900, 800],
          [900, 800],
        ],
        420,
      ),
    ).toBe(0);
  });

  it('does not judge the tail, where the background and the sensor speak', () => {
    expect(
      positionSpread(
        [
          [1420, 421],
          [1420, 425],
        ],
        420,
      ),
    ).toBe(0);
  });
});
