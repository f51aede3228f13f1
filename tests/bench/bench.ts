import { benchClones } from './clones';
import { benchPage } from './page';
import { benchPropagation } from './propagation';

await benchPropagation();
await benchClones();
await benchPage();
