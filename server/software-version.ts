import packageJson from '../package.json'

export const softwareVersion: string = packageJson.version
