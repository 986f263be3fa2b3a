/** The instrument's standard deviation of a level book that comes as a table, which has no column for it. */
import type { Building, LevelBook } from '../building.ts'

/** A digital level with an ordinary staff, as its makers state it for a kilometre of double run; common practice. */
export const USUAL_SD_MM_PER_SQRT_KM = 0.7
/** One setup of it at sights of 20 to 40 m; common practice. */
export const USUAL_SD_MM_PER_SETUP = 0.3

export interface BookSd {
  sd: Pick<LevelBook, 'sd_mm_per_sqrt_km' | 'sd_mm_per_setup'>
  note: string
}

/** As in the building's last level book; else the usual, of a kilometre where every sight is booked. */
export function bookSd(building: Pick<Building, 'survey'>, round: string, hasSights: boolean): BookSd {
  const last = building.survey.rounds.findLast((other) => other.book)
  if (last?.book) {
    const { sd_mm_per_sqrt_km, sd_mm_per_setup } = last.book
    const sd = {
      ...(sd_mm_per_sqrt_km !== undefined && { sd_mm_per_sqrt_km }),
      ...(sd_mm_per_setup !== undefined && { sd_mm_per_setup }),
    }
    return {
      sd,
      note: `Round ${round}: standard deviation of the instrument taken as in round ${last.id}, ${told(sd)}.`,
    }
  }
  const sd = hasSights ? { sd_mm_per_sqrt_km: USUAL_SD_MM_PER_SQRT_KM } : { sd_mm_per_setup: USUAL_SD_MM_PER_SETUP }
  const note = `Round ${round}: standard deviation of the instrument taken as ${told(sd)}, a usual value; correct it if the instrument is another.`
  return { sd, note }
}

function told({ sd_mm_per_sqrt_km, sd_mm_per_setup }: BookSd['sd']): string {
  const parts = []
  if (sd_mm_per_sqrt_km !== undefined) parts.push(`${sd_mm_per_sqrt_km} mm for a kilometre`)
  if (sd_mm_per_setup !== undefined) parts.push(`${sd_mm_per_setup} mm for a setup`)
  return parts.join(' and ')
}
