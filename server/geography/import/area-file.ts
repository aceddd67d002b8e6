import type { importFormats } from '../../../shared/schemas/outlines'

/** One feature of a file, before its outline was looked at. */
export interface FoundArea {
  name: string
  geometry: unknown
  /** What was done to it on the way from the file, in words. */
  repairs?: string[]
}

export interface AreaFile {
  format: (typeof importFormats)[number]
  /** What is to be known about the file as a whole. */
  notes: string[]
  areas: FoundArea[]
}

/** A file no area can be read from; the sentence is for the person who sent it. */
export class AreaFileRefused extends Error {
  override name = 'AreaFileRefused'
}

export const mostAreas = 500

const nameKeys = ['name', 'title', 'label', 'site', 'region', 'id']

/** What a feature calls itself; else the file's name, numbered where there are several. */
export function areaName(properties: unknown, id: unknown, fileName: string, place: number, count: number): string {
  const entries = Object.entries(typeof properties === 'object' && properties !== null ? properties : {})
  for (const key of nameKeys) {
    const value: unknown = entries.find(([name]) => name.toLowerCase() === key)?.[1]
    const text = typeof value === 'string' || typeof value === 'number' ? String(value).replace(/\0/g, '').trim() : ''
    if (text !== '') return text.slice(0, 100)
  }
  if ((typeof id === 'string' && id.trim() !== '') || typeof id === 'number') return String(id).trim().slice(0, 100)
  const stem = fileName.replace(/^.*[\\/]/, '').replace(/\.[^.]*$/, '').slice(0, 80) || 'Area'
  return count === 1 ? stem : `${stem} ${place + 1}`
}
