import { People1764547200001 } from './1764547200001-people';
import { Catalogue1764547200002 } from './1764547200002-catalogue';
import { Lending1764547200003 } from './1764547200003-lending';
import { Money1764547200004 } from './1764547200004-money';
import { Isolation1764547200005 } from './1764547200005-isolation';

export const migrations = [
  People1764547200001,
  Catalogue1764547200002,
  Lending1764547200003,
  Money1764547200004,
  Isolation1764547200005,
];
