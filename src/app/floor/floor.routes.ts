import type { Routes } from '@angular/router';
import { FloorPage } from './floor-page/floor-page';
import { tellOfUnsent } from './unsent-guard';

export const floorRoutes: Routes = [
  { path: '', title: 'Floor', component: FloorPage, canDeactivate: [tellOfUnsent] },
];
