/** Readings in and out of this browser as files. Loaded when the Hand over screen is first opened. */
import type { ExchangePort, ReportContent, Watch } from '../app/ports.ts';
import { PACKET_ENDING, PACKET_TYPE } from '../core/packet/packet-layout.ts';
import { packetBlock } from '../core/packet/packet-in-report.ts';
import { samplesCsv, samplesNpy } from '../core/packet/packet-samples.ts';
import type { TableReading } from '../core/packet/packet-readings-table.ts';
import { reportText } from '../text/report.ts';
import type { ExchangeParts } from './exchange-parts.ts';
import { pngOf, standaloneSvg } from './hand/chart-file.ts';
import { fileStem } from './hand/file-name.ts';
import { printPage } from './hand/print-page.ts';
import { saveFile, savesSafely } from './hand/save-file.ts';
import { canShareFile, shareFile } from './hand/share-file.ts';
import { readingsTableParts, writePacket } from './packet/write-packet.ts';
import { previewPacket } from './receive/preview-packet.ts';
import { chartSvg } from './report/report-charts.ts';
import { REPORT_TOKENS } from './report/report-style.ts';
import { listPage, PAGE_END, reportPage, type ReportFrame } from './report/report-page.ts';

const HTML_TYPE = 'text/html';
const CSV_TYPE = 'text/csv';

export function createExchange(parts: ExchangeParts): ExchangePort {
  const frame = (isPacket: boolean): ReportFrame => ({
    tokensCss: parts.tokensCss(REPORT_TOKENS),
    madeAt: parts.now().toISOString(),
    timeZone: Intl.DateTimeFormat().resolvedOptions().timeZone,
    about: parts.about,
    isPacket,
  });
  const day = () => parts.now().toISOString();
  return {
    async packet(readings, report, watch) {
      const page = (rows: readonly TableReading[]) =>
        report ? [reportPage(report, frame(false)), PAGE_END] : [listPage(rows, frame(false)), PAGE_END];
      const blob = await writePacket(parts, { readings, report: page, hasTable: true }, watch);
      const name = readings === 'all' ? 'everything' : siteOf(report);
      return new File([blob], `${fileStem(day(), name)}${PACKET_ENDING}`, { type: PACKET_TYPE });
    },
    report: (content, watch) => reportFile(parts, content, frame(true), watch),
    async readingsTable(readings, watch) {
      const table = await readingsTableParts(parts, readings, watch);
      return new File([...table], `${fileStem(day(), 'readings')}.csv`, { type: CSV_TYPE });
    },
    samples({ reading, recording }, as) {
      const practice = reading.practice ? 'practice' : undefined;
      const stem = fileStem(reading.recordedAt, practice, 'samples', reading._id.slice(-6));
      if (as === 'npy')
        return new File([samplesNpy(recording) as BlobPart], `${stem}.npy`, {
          type: 'application/octet-stream',
        });
      const lines = samplesCsv(recording, reportText.remarks(reading._id));
      return new File([...lines], `${stem}.csv`, { type: CSV_TYPE });
    },
    async chart(of, units, chart, as) {
      const svg = chartSvg(of, units, chart);
      if (svg === undefined) return undefined;
      const foot = reportText.chartFoot(of.reading.practice);
      const stem = fileStem(of.reading.recordedAt, chart, of.names.spot ?? of.label);
      return as === 'svg'
        ? new File([standaloneSvg(svg, foot).text], `${stem}.svg`, { type: 'image/svg+xml' })
        : new File([await pngOf(svg, foot)], `${stem}.png`, { type: 'image/png' });
    },
    preview: (file, watch) => previewPacket(parts, file, watch),
    canShare: canShareFile,
    get savesSafely() {
      return savesSafely();
    },
    share: shareFile,
    save: saveFile,
    print: printPage,
  };
}

const siteOf = (report: ReportContent | undefined): string | undefined =>
  report?.readings.find(({ names }) => names.site !== undefined)?.names.site;

/** The page with the packet of its readings inside: one file that anybody can read and the program can take in. */
async function reportFile(
  parts: ExchangeParts,
  content: ReportContent,
  frame: ReportFrame,
  watch: Watch,
): Promise<File> {
  const readings = content.readings.map(({ reading }) => reading._id);
  const packet = await writePacket(parts, { readings, hasTable: false }, watch);
  const block = packetBlock(new Uint8Array(await packet.arrayBuffer()));
  const name = `${fileStem(frame.madeAt, 'report', siteOf(content))}.html`;
  const body = [reportPage(content, frame), ...(block as readonly BlobPart[]), '\n', PAGE_END];
  return new File(body, name, { type: HTML_TYPE });
}
