import { compareShelf } from './compare.ts';

compareShelf(0, 4);
