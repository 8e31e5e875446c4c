import type { BeamGeometry } from './beam-geometry';
import { formatFixed } from './format-figure';
import { METRES_PER, type LinearUnit } from './units';

/** The beam in words, lengths in the show's unit: its title and accessible name. */
export function describeBeam(beam: BeamGeometry, unit: LinearUnit): string {
  const length = (metres: number) => `${formatFixed(metres / METRES_PER[unit])} ${unit}`;
  const percent = (share: number) => `${formatFixed(share * 100, 1, 3)} %`;
  const sentences = [`Longest along ${beam.axis}: ${length(beam.extent)}.`];
  if (beam.share === null) sentences.push('No centre of mass yet.');
  else if (beam.fulcrum?.outside) sentences.push(`Centre of mass outside the extent, at ${percent(beam.share)} of it.`);
  else sentences.push(`Balances at ${percent(beam.share)} of it.`);
  if (beam.gyration !== null) sentences.push(`Radius of gyration ${length(beam.gyration)}.`);
  if (beam.approvedShare !== null) sentences.push(`Approved at ${percent(beam.approvedShare)}.`);
  if (beam.partnerShare !== null) sentences.push(`Mirror partner at ${percent(beam.partnerShare)}.`);
  return sentences.join(' ');
}
