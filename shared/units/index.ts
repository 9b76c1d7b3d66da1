export * from './blood-pressure';
export * from './body';
export * from './distance';
export * from './heart-rate';
export * from './oxygen-uptake';
export * from './power';
export * from './quantity';
export * from './rounding';
