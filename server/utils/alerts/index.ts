export * from './due'
export * from './view'
