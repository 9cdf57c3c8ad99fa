import type { UtmPlace } from './automatic-utm';

const letters24 = 'ABCDEFGHJKLMNPQRSTUVWXYZ';
const bands = 'CDEFGHJKLMNPQRSTUVWX';
const columns = ['ABCDEFGH', 'JKLMNPQR', 'STUVWXYZ'] as const;

function digits(value: number, count: number): string {
  // Truncated, never rounded: the square that holds the place keeps its name.
  return String(Math.floor((value % 100_000) / 10 ** (5 - count))).padStart(count, '0');
}

function utmSquare(place: UtmPlace, lat: number): string {
  const band = bands[Math.min(19, Math.floor((lat + 80) / 8))]!;
  const column = columns[(place.zone - 1) % 3]![Math.floor(place.easting / 100_000) - 1]!;
  const row = letters24[(Math.floor(place.northing / 100_000) + (place.zone % 2 === 0 ? 5 : 0)) % 20]!;
  return `${String(place.zone).padStart(2, '0')}${band}${column}${row}`;
}

function polarSquare(place: UtmPlace): string {
  const [column, row] = [Math.floor(place.easting / 100_000), Math.floor(place.northing / 100_000)];
  const east = column >= 20;
  const north = place.hemisphere === 'N';
  const columnLetter = east ? 'ABCFGHJKLPQR'[column - 20]! : 'JKLPQRSTUXYZ'[column - 8]!;
  const rowLetter = letters24[row - (north ? 13 : 8)]!;
  return `${north ? (east ? 'Z' : 'Y') : east ? 'B' : 'A'}${columnLetter}${rowLetter}`;
}

/**
 * The military grid reference of a place.
 *
 * Truncated, not rounded, as the standard has it, so a reference names a square and not a point.
 *
 * @param place from `automaticUtm`
 * @param lat the latitude it came from, degrees (the band letter needs it)
 * @param figures per coordinate: 5 for 1 m, 2 for 1 km
 * @source NGA.STND.0037 (2014), Universal Grids and Grid Reference Systems
 * @example formatMgrs(helsinki, 60.1699, 5) // '35VLG8561172118'
 */
export function formatMgrs(place: UtmPlace, lat: number, figures: 1 | 2 | 3 | 4 | 5): string {
  const square = place.zone === 0 ? polarSquare(place) : utmSquare(place, lat);
  return `${square}${digits(place.easting, figures)}${digits(place.northing, figures)}`;
}
