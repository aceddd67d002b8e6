import type { Position } from 'geojson'

/** Something that was put right at a place, for the map. */
export interface RepairMark {
  longitude: number
  latitude: number
  about: string
}

const mostMarks = 40

/** What was put right in an outline: each thing said once, with the places where it was. */
export class Repairs {
  readonly texts = new Set<string>()
  readonly marks: RepairMark[] = []

  note(text: string, at?: Position): void {
    this.texts.add(text)
    if (at && this.marks.length < mostMarks) this.marks.push({ longitude: at[0]!, latitude: at[1]!, about: text })
  }
}
