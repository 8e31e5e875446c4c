import { render, screen } from '@testing-library/react';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Beam } from '@/components/beam/beam';
import { BEAM_BOX, beamGeometry, gyrationAlong, type BeamInput } from '@/lib/rules/beam-geometry';
import { describeBeam } from '@/lib/rules/describe-beam';
import { mirrorName } from '@/lib/rules/mirror-name';

type Box = BeamInput['bounds'];

/** A solid cuboid's moments by the handbooks: m (b² + c²) / 12. */
function cuboid(bounds: Box, mass = 1): BeamInput {
  const edge = [0, 1, 2].map((i) => bounds[i + 3] - bounds[i]);
  return {
    bounds,
    centre: [(bounds[0] + bounds[3]) / 2, (bounds[1] + bounds[4]) / 2, (bounds[2] + bounds[5]) / 2],
    mass,
    inertia: [
      (mass * (edge[1] ** 2 + edge[2] ** 2)) / 12,
      (mass * (edge[0] ** 2 + edge[2] ** 2)) / 12,
      (mass * (edge[0] ** 2 + edge[1] ** 2)) / 12,
    ],
    largest: Math.max(...edge),
  };
}

const edge = fc.double({ min: 0.01, max: 100, noNaN: true });
const place = fc.double({ min: -100, max: 100, noNaN: true });
const box = fc
  .tuple(place, place, place, edge, edge, edge)
  .map(([x, y, z, a, b, c]): Box => [x, y, z, x + a, y + b, z + c]);

describe('beamGeometry', () => {
  it('of a cuboid balances in the middle, with a radius of gyration of its length over √12', () => {
    fc.assert(
      fc.property(box, (bounds) => {
        const beam = beamGeometry(cuboid(bounds));
        expect(beam.share).toBeCloseTo(0.5, 6);
        expect(beam.gyration! / beam.extent).toBeCloseTo(1 / Math.sqrt(12), 6);
        expect(beam.fulcrum!.outside).toBe(0);
      }),
    );
  });

  it('stays within its box whatever it is given', () => {
    const far = fc.double({ min: -1e4, max: 1e4, noNaN: true });
    fc.assert(
      fc.property(box, far, far, far, edge, (bounds, x, y, z, largest) => {
        const beam = beamGeometry({
          ...cuboid(bounds),
          centre: [x, y, z],
          approved: [z, x, y],
          partner: [y, z, x],
          largest,
        });
        const places = [
          beam.start,
          beam.end,
          ...(beam.bracket ?? []),
          beam.fulcrum!.at,
          beam.approvedAt!,
          beam.partnerAt!,
        ];
        for (const at of places) {
          expect(at).toBeGreaterThanOrEqual(5);
          expect(at).toBeLessThanOrEqual(BEAM_BOX.width - 5);
        }
      }),
    );
  });

  it('draws a part of the left side as its partner of the right side', () => {
    fc.assert(
      fc.property(box, fc.double({ min: 0, max: 1, noNaN: true }), (one, share) => {
        const shift = 101 - Math.min(0, one[0]);
        const right: Box = [one[0] + shift, one[1], one[2], one[3] + shift, one[4], one[5]];
        const left: Box = [-right[3], right[1], right[2], -right[0], right[4], right[5]];
        const centre = (bounds: Box): [number, number, number] => [
          bounds[0] + share * (bounds[3] - bounds[0]),
          bounds[1],
          bounds[2],
        ];
        const centreRight = centre(right);
        const centreLeft: [number, number, number] = [-centreRight[0], centreRight[1], centreRight[2]];
        const drawnRight = beamGeometry({ ...cuboid(right), centre: centreRight, partner: centreLeft });
        const drawnLeft = beamGeometry({ ...cuboid(left), centre: centreLeft, partner: centreRight });
        expect(drawnLeft.axis).toBe(drawnRight.axis);
        expect(drawnLeft.share).toBeCloseTo(drawnRight.share!, 6);
        expect(drawnLeft.partnerShare).toBeCloseTo(drawnLeft.share!, 6);
      }),
    );
  });

  it('breaks off beyond the end on which the centre lies', () => {
    const bounds: Box = [0, 0, 0, 1, 0.2, 0.2];
    const at = (x: number) => beamGeometry({ ...cuboid(bounds), centre: [x, 0.1, 0.1] }).fulcrum!;
    expect(at(-0.01).outside).toBe(-1);
    expect(at(1.01).outside).toBe(1);
    expect(at(0).outside).toBe(0);
    expect(at(1).outside).toBe(0);
  });

  it('tells a shell from a solid: a thin sphere spreads r/√3, a full one r/√5', () => {
    // Handbook: hollow sphere 2mr²/3, solid sphere 2mr²/5.
    expect(gyrationAlong('x', [2 / 3, 2 / 3, 2 / 3], 1)).toBeCloseTo(1 / Math.sqrt(3), 12);
    expect(gyrationAlong('z', [2 / 5, 2 / 5, 2 / 5], 1)).toBeCloseTo(1 / Math.sqrt(5), 12);
  });

  it('keeps a small part 12 wide and draws no balance where there is none', () => {
    const beam = beamGeometry({ ...cuboid([0, 0, 0, 0.01, 0.01, 0.02]), centre: null, largest: 50 });
    expect(beam.end - beam.start).toBe(12);
    expect([beam.fulcrum, beam.bracket]).toEqual([null, null]);
  });
});

describe('Beam', () => {
  it('says its numbers in title and accessible name', () => {
    const geometry = beamGeometry(cuboid([0, 0, 0, 1, 0.2, 0.2]));
    const label = describeBeam(geometry, 'cm');
    expect(label).toBe('Longest along x: 100.0 cm. Balances at 50.0 % of it. Radius of gyration 28.87 cm.');
    render(<Beam geometry={geometry} label={label} />);
    expect(screen.getByRole('img', { name: label }).querySelector('title')).toHaveTextContent(label);
  });
});

describe('mirrorName', () => {
  it.each([
    ['horn_L', 'horn_R'],
    ['R_foot', 'L_foot'],
    ['arm.left.low', 'arm.right.low'],
    ['leg_lf', 'leg_rt'],
    ['Left_wing', 'Right_wing'],
  ])('of %s is %s', (name, other) => {
    expect(mirrorName(name)).toBe(other);
    expect(mirrorName(other)).toBe(name);
  });

  it.each(['torso', 'loft', 'rail', 'L_to_R'])('of %s is none', (name) => expect(mirrorName(name)).toBeNull());
});
