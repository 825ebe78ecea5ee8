import { formatHex, interpolate } from 'culori/fn';
