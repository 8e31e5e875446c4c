interface StoredPlace {
  face: number | null;
  edge: [number, number] | null;
  vertex: number | null;
  position: (number | null)[] | null;
}

/** Where a finding sits, as text: `edge 3 to 9 at (0.5, 1, 2)`. Null where nothing of it is known. */
export function placeText(place: StoredPlace): string | null {
  const what = place.edge ? `edge ${place.edge[0]} to ${place.edge[1]}` : place.vertex !== null ? `vertex ${place.vertex}` : place.face !== null ? `face ${place.face}` : null;
  const at = place.position?.every((value) => typeof value === 'number') ? `at (${place.position.join(', ')})` : null;
  return [what, at].filter((word) => word !== null).join(' ') || null;
}
