/** An ellipsoid of revolution: equatorial radius in m and inverse flattening (Infinity for a sphere). */
export type Ellipsoid = { readonly a: number; readonly inverseFlattening: number };

const fromAxes = (a: number, b: number): Ellipsoid => ({ a, inverseFlattening: a / (a - b) });

/**
 * Ellipsoids by their PROJ name. Values: EPSG registry; clrk80 as PROJ has it. Airy is held by its inverse flattening, because the semi-minor
 * axis that circulates (6356256.909 m) is 0.2 mm off in a northing.
 */
const ellipsoids: Readonly<Record<string, Ellipsoid>> = {
  WGS84: { a: 6378137, inverseFlattening: 298.257223563 },
  GRS80: { a: 6378137, inverseFlattening: 298.257222101 },
  airy: { a: 6377563.396, inverseFlattening: 299.3249646 },
  mod_airy: { a: 6377340.189, inverseFlattening: 299.3249646 },
  bessel: { a: 6377397.155, inverseFlattening: 299.1528128 },
  clrk66: fromAxes(6378206.4, 6356583.8),
  clrk80ign: { a: 6378249.2, inverseFlattening: 293.4660212936269 },
  intl: { a: 6378388, inverseFlattening: 297 },
  krass: { a: 6378245, inverseFlattening: 298.3 },
  GRS67: { a: 6378160, inverseFlattening: 298.247167427 },
  aust_SA: { a: 6378160, inverseFlattening: 298.25 },
  helmert: { a: 6378200, inverseFlattening: 298.3 },
  clrk80: { a: 6378249.145, inverseFlattening: 293.4663 },
  evrst30: { a: 6377276.345, inverseFlattening: 300.8017 },
  evrstSS: { a: 6377298.556, inverseFlattening: 300.8017 },
  WGS72: { a: 6378135, inverseFlattening: 298.26 },
};

/** The ellipsoid of a PROJ name, or null for a name not in the table. */
export function findEllipsoid(name: string): Ellipsoid | null {
  return Object.hasOwn(ellipsoids, name) ? ellipsoids[name]! : null;
}

/** Squared first eccentricity, f(2 - f). */
export function eccentricitySquared(ellipsoid: Ellipsoid): number {
  const f = Number.isFinite(ellipsoid.inverseFlattening) ? 1 / ellipsoid.inverseFlattening : 0;
  return f * (2 - f);
}
