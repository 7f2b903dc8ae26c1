/** Days and instants as the shop writes them: "11 Mar 1961", in the shop's zone. */
export function useShopDates(timeZone = 'Europe/London') {
  const dayFormat = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', year: 'numeric', timeZone: 'UTC' })
  const instantDay = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', year: 'numeric', timeZone })
  const instantFormat = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', year: 'numeric', hour: '2-digit', minute: '2-digit', timeZone })
  return {
    /** A calendar day, `2024-03-11`. */
    day: (iso: string) => dayFormat.format(new Date(`${iso.slice(0, 10)}T00:00:00Z`)),
    /** The day of an instant. */
    dayOf: (iso: string) => instantDay.format(new Date(iso)),
    /** The day it is now, `2026-03-11`. */
    today: () => new Intl.DateTimeFormat('en-CA', { timeZone }).format(new Date()),
    /** An instant with its time. */
    instant: (iso: string) => instantFormat.format(new Date(iso)),
  }
}
