/** The tokens a canvas draws with, read from the theme's variables. */
export interface ChartInk {
  paper: string
  ink: string
  ink2: string
  ink3: string
  rule: string
  rule2: string
  ember: string
  emberTint: string
  band: string
}

export const figuresFont = "'Atkinson Hyperlegible Mono Variable', ui-monospace, monospace"

export function readChartInk(): ChartInk {
  const style = getComputedStyle(document.documentElement)
  const token = (name: string) => style.getPropertyValue(`--${name}`).trim() || 'currentColor'
  return {
    paper: token('paper'),
    ink: token('ink'),
    ink2: token('ink2'),
    ink3: token('ink3'),
    rule: token('rule'),
    rule2: token('rule2'),
    ember: token('ember'),
    emberTint: token('emberTint'),
    band: token('band'),
  }
}
