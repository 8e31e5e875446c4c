/** Acts of the history as what somebody did. An act that is not here is shown by its own name. */
const ACT_WORDS: Record<string, string> = {
  'create-show': 'made the show',
  'edit-show': 'changed the show’s settings',
  'set-member': 'gave a role',
  'remove-member': 'took out of the show',
  'open-import': 'opened an import',
  'submit-import': 'submitted an import',
  'cancel-import': 'cancelled an import',
  'retry-import': 'tried failed files again',
  'pause-import': 'paused an import',
  'resume-import': 'let an import go on',
  'import-version': 'imported a version',
  'set-values': 'set values',
  'rename-part': 'confirmed a rename',
  'refuse-rename': 'kept two parts apart',
  'ask-for-approval': 'asked for approval',
  'take-question-back': 'took a question back',
  'approve-values': 'approved',
  'carry-over': 'carried approvals over',
  'withdraw-approvals': 'took approvals back',
  'put-shots': 'put into shots',
  'remove-from-shot': 'took out of a shot',
  'lock-values': 'locked',
  'unlock-values': 'unlocked',
  'draft-override': 'drafted an override',
  'drop-override': 'dropped an override',
  'set-told': 'chose what they are told of',
  'add-material': 'added a material',
  'edit-material': 'changed a material',
};

export function actWords(act: string): string {
  return ACT_WORDS[act] ?? act.replaceAll('-', ' ');
}

/** Where a change came from, said only where it was not made by hand. */
export const ORIGIN_WORDS = { hand: '', rule: 'by a rule', spreadsheet: 'by spreadsheet', api: 'by script', import: 'by import' } as const;

const FIELD_WORDS: Record<string, string> = {
  target_mass_kg: 'target mass, kg',
  density_kg_m3: 'density, kg/m³',
  areal_density_kg_m2: 'weight per area, kg/m²',
  wall_m: 'wall thickness, m',
  linear_unit: 'unit',
  up_axis: 'up axis',
  parts_by: 'parts by',
  boundary: 'boundary rule',
  other_space: 'files in another unit or axis',
  name_pattern: 'name pattern',
  self_approval: 'own values may be approved',
  tolerance_mass_percent: 'tolerance of the mass, %',
  tolerance_com_percent: 'tolerance of the centre of mass, % of size',
  tolerance_moments_percent: 'tolerance of the inertia, %',
  left_out: 'left out',
  override_approval: 'approval of the override',
  asked: 'asked for',
  in_shot: 'in shot',
  told: 'told of it',
};

/** Fields that are yes or no. */
const YES_OR_NO: ReadonlySet<string> = new Set(['self_approval', 'archived', 'left_out', 'told']);

/** A field in words; of a lock and of an override the shot comes with it: `lock fer_0010 2`, `mil_0020: target_mass_kg`. */
export function fieldWords(field: string): string {
  const lock = /^lock (\S+)(?: (\S+))?$/.exec(field);
  if (lock) return `lock in ${lock[1]}${lock[2] === undefined ? '' : `, copy ${lock[2]}`}`;
  const ofShot = /^([^:\s]+): (.+)$/.exec(field);
  if (ofShot) return `${fieldWords(ofShot[2])} in ${ofShot[1]}`;
  return FIELD_WORDS[field] ?? field.replaceAll('_', ' ');
}

/** What a field was or became, as a reader says it. */
export function changeWords(field: string, text: string): string {
  const plain = field.replace(/^[^:\s]+: /, '');
  return YES_OR_NO.has(plain) && (text === 'true' || text === 'false') ? (text === 'true' ? 'yes' : 'no') : text;
}
