import type { App } from '../app'

let pending: Promise<App> | undefined

/** Called once by the start plugin; Nitro does not await plugins, so routes await this promise instead. */
export function setApp(app: Promise<App>): void {
  pending = app
}

/** The running application. */
export function useApp(): Promise<App> {
  if (!pending) throw new Error('the application was not started')
  return pending
}
