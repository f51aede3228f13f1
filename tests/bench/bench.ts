import { benchPropagation } from './propagation';

await benchPropagation();
