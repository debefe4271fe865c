export * from './changes'
export * from './outages'
export * from './people'
export * from './sites'
