/** Names shared by preload, IPC gate and HTTP server, so that none is written twice. Apart from the schemas, which a preload need not carry. */
export const channels = { request: 'rampfold:request', event: 'rampfold:event', bridge: 'rampfold' } as const
export const httpPaths = { request: '/request/', events: '/events' } as const
