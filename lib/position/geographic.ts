/** A place on an ellipsoid, degrees; north and east are positive. */
export type Geographic = { readonly lat: number; readonly lon: number };

/** Whether both numbers are finite and the latitude lies in [-90, 90], the longitude in [-180, 180]. */
export function isGeographic(place: Geographic): boolean {
  return Number.isFinite(place.lat) && Number.isFinite(place.lon) && Math.abs(place.lat) <= 90 && Math.abs(place.lon) <= 180;
}
