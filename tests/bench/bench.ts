import { benchPage } from './page';
import { benchPropagation } from './propagation';

await benchPropagation();
await benchPage();
