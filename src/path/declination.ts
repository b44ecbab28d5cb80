/**
 * Angle from true to magnetic north, east positive, by the World Magnetic Model of the date.
 *
 * A magnetic heading is the true one less the declination. The package with the model's coefficients is loaded
 * with the first call.
 *
 * Source: World Magnetic Model (NOAA NCEI and BGS), in the edition that holds at the date
 * Valid:  end of 2014 to autumn of 2029; good to about half a degree where no iron is near (from memory)
 *
 * @param latitude   [deg], north positive
 * @param longitude  [deg], east positive
 * @param heightKm   above mean sea level [km]
 * @param date       of the reading
 * @returns declination [deg] and the name of the model
 * @throws RangeError on a date that no edition covers
 */
export async function declination({
  latitude,
  longitude,
  heightKm,
  date,
}: {
  readonly latitude: number;
  readonly longitude: number;
  readonly heightKm: number;
  readonly date: Date;
}): Promise<{ readonly declinationDeg: number; readonly model: string }> {
  const { default: geomagnetism } = await import("geomagnetism");
  const model = modelOf(geomagnetism, date);
  if (model === undefined) {
    throw new RangeError(
      `no edition of the World Magnetic Model at hand covers ${date.toISOString().slice(0, 10)}`,
    );
  }
  return { declinationDeg: model.point([latitude, longitude, heightKm]).decl, model: model.name };
}

type Package = typeof import("geomagnetism");

/** The package throws a plain error where it has no edition. */
function modelOf(geomagnetism: Package, date: Date) {
  try {
    return geomagnetism.model(date);
  } catch {
    return undefined;
  }
}
