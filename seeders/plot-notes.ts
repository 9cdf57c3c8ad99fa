import type { SeededRandom } from './seeded-random';

const directions = ['north', 'north-east', 'east', 'south-east', 'south', 'south-west', 'west', 'north-west'] as const;
const landmarks = [
  'the split boulder', 'the second culvert', 'the old salt lick', 'the corner stone 14', 'the high seat', 'the log landing', 'the spring with the iron pipe',
  'the bend with the turning place', 'the blazed double beech', 'the end of the drystone wall',
] as const;
const paths = [
  'along the skid trail', 'up the compartment ride', 'along the contour', 'along the ditch', 'through the thicket by the cut line', 'down the deer track',
] as const;
const hazards = [
  'Standing dead spruce within falling distance of the centre: look up before laying out, not in wind.',
  'Hung-up top over the north side, about 8 m up. Do not work beneath it.',
  'Steep: 60 % fall below the centre. Work upslope of each other, nobody below.',
  'Old quarry edge 15 m west of the centre, hidden by bramble.',
  'Boggy ground to the knee east of the stream; cross only at the plank.',
  'Wasps in the hollow beech near the access path, late summer.',
  'Loose scree under leaf litter; helmets while crossing.',
  'Windthrow with stems under tension on the way in: walk round it, do not climb through.',
  'Shoot on Wednesdays and Saturdays in October and November: ask the lead first.',
] as const;

/** How a crew gets from the gate to the plot. Distances in whole tens of metres, or of feet in a project that walks in feet. */
export function wayInNote(random: SeededRandom, gate: string, unit: 'm' | 'ft'): string {
  const perMetre = unit === 'm' ? 1 : 3;
  const road = random.whole(12, 140) * 10 * perMetre;
  const walk = random.whole(6, 42) * 10 * perMetre;
  return `Park at ${gate}. Forest road ${road} ${unit} to ${random.pick(landmarks)}, then ${walk} ${unit} ${random.pick(directions)} ${random.pick(paths)}.`;
}

/** What can hurt people there; empty where nothing more than the usual is known (about two plots in three). */
export function hazardNote(random: SeededRandom): string {
  return random.uniform() < 0.36 ? random.pick(hazards) : '';
}
