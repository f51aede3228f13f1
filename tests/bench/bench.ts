import { benchClones, benchFirstOrder } from './clones';
import { benchPage } from './page';
import { benchPropagation } from './propagation';

await benchPropagation();
await benchFirstOrder();
await benchClones();
await benchPage();
