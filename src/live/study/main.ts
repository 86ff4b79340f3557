/// <reference lib="dom" />
/// <reference lib="dom.iterable" />
import { readCharts } from './chart-reading.ts';
import { writeLocalNumbers } from './decimal-mark.ts';

/** What brings the page of a study to life: values under the pointer, the reader's numbers, the table to download. */
writeLocalNumbers();
readCharts();
offerTable();

function offerTable(): void {
  const data = document.getElementById('looptally-data')?.textContent;
  const button = document.getElementById('take-csv');
  if (!data || button === null) return;
  const { csv } = JSON.parse(data) as { csv: { name: string; text: string } };
  button.hidden = false;
  button.addEventListener('click', () => {
    const address = URL.createObjectURL(new Blob([csv.text], { type: 'text/csv;charset=utf-8' }));
    const link = document.createElement('a');
    link.href = address;
    link.download = csv.name;
    link.click();
    // The browser reads the address after this turn.
    setTimeout(() => URL.revokeObjectURL(address), 10_000);
  });
}
