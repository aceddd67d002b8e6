import '@testing-library/jest-dom/vitest'
import { cleanup } from '@testing-library/react'
import { afterEach, beforeEach, expect, vi } from 'vitest'

/** A page that complains to the console has a fault, whatever else it shows. */
let complaints: unknown[][] = []

beforeEach(() => {
  complaints = []
  vi.spyOn(console, 'error').mockImplementation((...words: unknown[]) => {
    complaints.push(words)
  })
})

afterEach(() => {
  cleanup()
  localStorage.clear()
  const said = complaints
  vi.restoreAllMocks()
  vi.unstubAllGlobals()
  expect(said).toEqual([])
})
