/** The device's date with its distance from UTC, as a record needs it: 2026-03-31T14:05:00+02:00. */

/** @param {Date} at */
export function isoWithOffset(at) {
  const minutes = -at.getTimezoneOffset(), two = (number) => String(number).padStart(2, "0");
  const local = new Date(at.getTime() + minutes * 60_000).toISOString().slice(0, 19);
  return `${local}${minutes < 0 ? "-" : "+"}${two(Math.floor(Math.abs(minutes) / 60))}:${two(Math.abs(minutes) % 60)}`;
}
