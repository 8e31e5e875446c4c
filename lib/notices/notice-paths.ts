const showPath = (show: string): string => `/shows/${encodeURIComponent(show)}`;

/** The page of one shot, or the list where there are several. */
export function shotsLink(show: string, shots: readonly string[]): { label: string; path: string } {
  const [only, ...rest] = new Set(shots);
  if (only !== undefined && rest.length === 0) return { label: `Open ${only}`, path: `${showPath(show)}/shots/${encodeURIComponent(only)}` };
  return { label: 'Open the shots', path: `${showPath(show)}/shots` };
}

/** The page of one part, or the show's table where there are several. */
export function partsLink(show: string, parts: readonly { asset: string; part: string }[]): { label: string; path: string } {
  if (parts.length !== 1) return { label: 'Open the parts', path: showPath(show) };
  const [{ asset, part }] = parts;
  return { label: `Open ${asset}/${part}`, path: `${showPath(show)}/assets/${encodeURIComponent(asset)}/${encodeURIComponent(part)}` };
}

export function approvalsLink(show: string): { label: string; path: string } {
  return { label: 'Open the approvals', path: `${showPath(show)}/approvals` };
}

/** Shots that hold locks out of date. */
export function outdatedShotsLink(show: string): { label: string; path: string } {
  return { label: 'Open the shots that are out of date', path: `${showPath(show)}/shots?state=outdated` };
}

/** Where a guest begins: other pages of a show are not theirs. */
export const GUEST_LINK = { label: 'Open Weighhouse', path: '/shows' };
