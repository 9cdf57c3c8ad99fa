import proj4 from 'proj4';

/** Degrees WGS 84 of a point on a UTM grid of the northern hemisphere (WGS 84), to 1e-7 degrees, about a centimetre. */
export function plannedPosition(zone: number, eastingM: number, northingM: number): { plannedLat: number; plannedLon: number } {
  const [lon, lat] = proj4(`+proj=utm +zone=${zone} +datum=WGS84 +units=m +no_defs`, 'WGS84', [eastingM, northingM]);
  // Rounded, because the last digits of sines differ between engines and the same seed must give the same record.
  return { plannedLat: Number(lat.toFixed(7)), plannedLon: Number(lon.toFixed(7)) };
}
