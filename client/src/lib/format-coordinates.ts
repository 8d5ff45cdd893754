/** A latitude as "59.4127° N", degrees north positive. */
export function formatLatitude(latitudeDeg: number, decimals = 4): string {
  return `${Math.abs(latitudeDeg).toFixed(decimals)}°\u00A0${latitudeDeg < 0 ? 'S' : 'N'}`;
}

/** A longitude as "16.4310° W", degrees east positive; wrapped into ±180. */
export function formatLongitude(longitudeDeg: number, decimals = 4): string {
  const wrapped = ((((longitudeDeg + 180) % 360) + 360) % 360) - 180;
  return `${Math.abs(wrapped).toFixed(decimals)}°\u00A0${wrapped < 0 ? 'W' : 'E'}`;
}

/** A position, latitude first as people read it: "59.4127° N 16.4310° W". */
export function formatCoordinates(latitudeDeg: number, longitudeDeg: number, decimals = 4): string {
  return `${formatLatitude(latitudeDeg, decimals)} ${formatLongitude(longitudeDeg, decimals)}`;
}
