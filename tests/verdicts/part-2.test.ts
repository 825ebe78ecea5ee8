import { compareShelf } from './compare.ts';

compareShelf(1, 4);
