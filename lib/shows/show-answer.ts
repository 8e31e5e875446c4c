import type { Show } from './get-show-access';

/** A show as the API shows it. */
export function showAnswer(show: Show) {
  return {
    code: show.code,
    title: show.title,
    linear_unit: show.linearUnit,
    up_axis: show.upAxis,
    scheme: show.scheme,
    boundary: show.boundary,
    parts_by: show.partsBy,
    other_space: show.otherSpace,
    name_pattern: show.namePattern,
    self_approval: show.selfApproval,
    tolerance_mass_percent: show.toleranceMassPercent,
    tolerance_com_percent: show.toleranceComPercent,
    tolerance_moments_percent: show.toleranceMomentsPercent,
    frozen: show.frozenAt !== null,
    archived: show.archivedAt !== null,
    created_at: show.createdAt.toISOString(),
  };
}
