/** Names by which providers mark cells that are no water seen well. Bright water stays: the mask may hide the bloom itself. */
const usuallyHidden = new Set([
  'atmfail', 'land', 'hilt', 'hisatzen', 'hisolzen', 'straylight', 'cldice', 'lowlw', 'chlfail', 'navwarn', 'navfail', 'maxaeriter', 'seaice', 'bowtiedel', 'filter',
])
const wordsHidden = /(^|_)(cloud|clouds|land|ice|snow|shadow|invalid|bad|saturated|no_data|nodata|missing)(_|$)/
const denied = /^(no|not|non|without)_|_free$|clear/

/** Which of a file's flag meanings a feed should hide, as a proposal for a person to confirm. */
export function proposeHiddenFlags(meanings: readonly string[]): string[] {
  return meanings.filter((meaning) => {
    const name = meaning.toLowerCase()
    return usuallyHidden.has(name) || (wordsHidden.test(name) && !denied.test(name))
  })
}
