export * from './blobs'
export * from './people'
export * from './work'
