export * from './answer';
export * from './policy';
export * from './request';
export * from './request-bounds';
