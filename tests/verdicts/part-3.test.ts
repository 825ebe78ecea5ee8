import { compareShelf } from './compare.ts';

compareShelf(2, 4);
