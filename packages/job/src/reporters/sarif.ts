import { RULES, rulePage } from '@slewcurve/survey';
import type { FileReport, Report, ReportedFinding } from '../report.js';
import { sayFault, sayPlace, sayRemedy } from './say-finding.js';

/** OASIS, Static Analysis Results Interchange Format (SARIF) 2.1.0. */
const SCHEMA = 'https://docs.oasis-open.org/sarif/sarif/v2.1.0/os/schemas/sarif-schema-2.1.0.json';

/**
 * The report as SARIF 2.1.0: one run, one result a finding. The track is a logical location, times and values stand in the property
 * bag, files that can't be read are notifications of the invocation.
 *
 * @param folder absolute path, forward slashes, of the folder that files are given relative to; names within it become relative
 */
export function sarifReport(report: Report, folder = ''): string {
  const findings = report.files.flatMap((file) => file.findings);
  const ids = new Set(findings.map(({ rule }) => rule));
  const rules = RULES.filter(({ id }) => ids.has(id));
  const numbers = new Map(rules.map(({ id }, index) => [id, index]));
  const uriOf = (file: string): string => relativeUri(file, folder);
  const run = {
    tool: {
      driver: {
        name: report.tool.name,
        version: report.tool.version,
        semanticVersion: report.tool.version,
        rules: rules.map(sarifRule),
      },
    },
    columnKind: 'utf16CodeUnits',
    artifacts: report.files.map(({ file }) => ({ location: location(uriOf(file)) })),
    invocations: [
      {
        executionSuccessful: report.files.every(({ status }) => status === 'surveyed'),
        toolExecutionNotifications: report.files.flatMap((file) => notifications(file, uriOf(file.file))),
      },
    ],
    results: report.files.flatMap((file, artifact) =>
      file.findings.map((finding) => ({
        ...result(finding, report),
        ruleIndex: numbers.get(finding.rule) ?? -1,
        locations: [
          {
            physicalLocation: { artifactLocation: { ...location(uriOf(file.file)), index: artifact } },
            logicalLocations: [
              {
                name: finding.track.split('/').at(-1) ?? finding.track,
                fullyQualifiedName: `${finding.clip}/${finding.track}`,
                kind: 'track',
              },
            ],
          },
        ],
      })),
    ),
    properties: {
      playbacks: report.playbacks,
      failAt: report.failAt,
      totals: report.totals,
      verdict: report.verdict,
      ...(report.shard && { shard: report.shard }),
    },
  };
  return `${JSON.stringify({ $schema: SCHEMA, version: '2.1.0', runs: [run] }, null, 2)}\n`;
}

function sarifRule(rule: (typeof RULES)[number]): object {
  return {
    id: rule.id,
    shortDescription: { text: rule.summary },
    fullDescription: { text: rule.page.what },
    help: { text: `${rule.page.people}\n\n${rule.page.remedy}`, markdown: rulePage(rule) },
    defaultConfiguration: { level: rule.level },
    properties: { tags: [rule.family, ...rule.alsoCalled] },
  };
}

function result(finding: ReportedFinding, report: Report): object {
  const remedy = sayRemedy(finding);
  const stamps = finding.muted === 'stamped' ? stampsOf(finding) : [];
  return {
    ruleId: finding.rule,
    level: finding.level,
    message: {
      text: `${sayPlace(finding)}: ${sayFault(finding)}.${remedy === '' ? '' : ` Try: ${remedy}.`}`,
    },
    partialFingerprints: { 'slewcurve/v1': finding.fingerprint },
    ...(report.gone !== undefined && {
      baselineState: finding.muted === 'known' ? 'unchanged' : 'new',
    }),
    ...(stamps.length > 0 && { suppressions: stamps }),
    occurrenceCount: finding.count,
    properties: bag(finding),
  };
}

function bag({ time, frame, keys, span, value, unit, limit, playback, ...rest }: ReportedFinding): object {
  const { owner, confidence, effect, remedy, occurrences } = rest;
  return {
    time,
    frame,
    keys,
    span,
    value,
    unit,
    limit,
    playback,
    owner,
    confidence,
    effect,
    remedy,
    places: occurrences.map((place) => ({
      time: place.time,
      keys: place.keys,
      value: place.value,
      level: place.level,
      fingerprint: place.fingerprint,
    })),
  };
}

/** One suppression for each reason that the finding's places were accepted with. */
function stampsOf({ occurrences }: ReportedFinding): object[] {
  const stamps = occurrences.flatMap(({ stamp }) => stamp ?? []);
  const said = new Map(stamps.map((stamp) => [JSON.stringify(stamp), stamp]));
  return [...said.values()].map(({ reason, by, date }) => ({
    kind: 'external',
    status: 'accepted',
    justification: reason,
    properties: { by, date },
  }));
}

function notifications({ error, problems = [] }: FileReport, uri: string): object[] {
  const told = (level: string, code: string, message: string): object => ({
    level,
    message: { text: message },
    descriptor: { id: code },
    locations: [{ physicalLocation: { artifactLocation: location(uri) } }],
  });
  return [
    ...(error ? [told('error', error.code, error.message)] : []),
    ...problems.map(({ code, level = 'note', message }) => told(level, code, message)),
  ];
}

/** A relative reference is relative to where the sources are: whoever reads the file knows where that is. */
function location(uri: string): { readonly uri: string; readonly uriBaseId?: string } {
  return /^[a-z][a-z\d+.-]*:/i.test(uri) ? { uri } : { uri, uriBaseId: '%SRCROOT%' };
}

/** A file's name as a URI reference (RFC 3986), relative where it can be. */
function relativeUri(file: string, folder: string): string {
  const prefix = folder.endsWith('/') ? folder : `${folder}/`;
  const inside = prefix !== '/' && file.startsWith(prefix) ? file.slice(prefix.length) : file;
  const path = inside.replace(/^(?:\.\/+)+/, '');
  const drive = /^([a-z]:)(\/.*)$/i.exec(path);
  if (drive) return `file:///${drive[1]}${encoded(drive[2] ?? '')}`;
  return path.startsWith('/') ? `file://${encoded(path)}` : encoded(path);
}

function encoded(path: string): string {
  return path.split('/').map(encodeSegment).join('/');
}

/** A lone surrogate has no UTF-8: it becomes the replacement character, as in every other text that is written. */
function encodeSegment(text: string): string {
  return encodeURIComponent(
    text.replace(/[\uD800-\uDBFF](?![\uDC00-\uDFFF])|(?<![\uD800-\uDBFF])[\uDC00-\uDFFF]/g, '\uFFFD'),
  );
}
