import { ensureBuild } from '../../scripts/build.mjs'

/** Server and browser tests run against the production build. */
export default function setup(): void {
  ensureBuild()
}
