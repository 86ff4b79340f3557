import './no-eval.ts';
import type { LiveData } from '../sheets/page/live-data.ts';
import { bringToLife } from './live-page.ts';

const data = document.querySelector('#looptally-data')?.textContent;
if (data !== undefined && data !== null) void bringToLife(JSON.parse(data) as LiveData);
