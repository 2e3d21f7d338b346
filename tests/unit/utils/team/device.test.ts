import { expect, it } from 'vitest'
import { deviceName } from '../../../../utils/team/device'

it.each([
  ['Mozilla/5.0 (X11; Linux x86_64; rv:140.0) Gecko/20100101 Firefox/140.0', 'Firefox on Linux'],
  [
    'Mozilla/5.0 (Windows NT 10.0; Win64; x64) AppleWebKit/537.36 Chrome/140.0 Safari/537.36 Edg/140.0',
    'Edge on Windows',
  ],
  ['Mozilla/5.0 (Linux; Android 15) AppleWebKit/537.36 Chrome/140.0 Mobile Safari/537.36', 'Chrome on Android'],
  ['Mozilla/5.0 (iPhone; CPU iPhone OS 19_0 like Mac OS X) Version/19.0 Mobile Safari/604.1', 'Safari on iPhone'],
  ['Mozilla/5.0 (Macintosh; Intel Mac OS X 10_15) AppleWebKit/605.1 Version/19 Safari/605.1', 'Safari on macOS'],
  ['curl/8.9.1', 'curl/8.9.1'],
  [' ', 'Unknown program'],
])('names %s', (userAgent, name) => expect(deviceName(userAgent)).toBe(name))
