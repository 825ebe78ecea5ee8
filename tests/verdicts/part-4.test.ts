import { compareShelf } from './compare.ts';

compareShelf(3, 4);
