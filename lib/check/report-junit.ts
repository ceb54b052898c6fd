import { isConfirmed, type Finding } from "@/lib/verify/finding";
import type { FileFault, FilesReport } from "./check-files";

/**
 * The findings as JUnit XML: a suite for each file, a case for each claim. A discrepant or contradicted claim fails; one
 * that could not be read or decided, and a part of a file that could not be used, is an error.
 */
export function junitReport({ findings, faults }: FilesReport): string {
  const files = [...new Set([...findings.map(fileOf), ...faults.map(({ file }) => file)])];
  const suites = files.map((file) =>
    suite(
      file,
      findings.filter((finding) => fileOf(finding) === file),
      faults.filter((fault) => fault.file === file),
    ),
  );
  const total = (key: "tests" | "failures" | "errors") => suites.reduce((sum, each) => sum + each[key], 0);
  return [
    '<?xml version="1.0" encoding="UTF-8"?>',
    `<testsuites name="Surdmark" tests="${total("tests")}" failures="${total("failures")}" errors="${total("errors")}">`,
    ...suites.map(({ xml }) => xml),
    "</testsuites>",
    "",
  ].join("\n");
}

const fileOf = ({ place }: Finding) => place?.file ?? "";

function suite(file: string, findings: readonly Finding[], faults: readonly FileFault[]) {
  const failures = findings.filter(
    ({ verdict }) => verdict === "discrepant" || verdict === "contradicted",
  ).length;
  const undecided = findings.filter(
    ({ verdict }) => verdict === "unreadable" || verdict === "undecided",
  ).length;
  const [tests, errors] = [findings.length + faults.length, undecided + faults.length];
  const xml = [
    `  <testsuite name="${escape(file)}" tests="${tests}" failures="${failures}" errors="${errors}" skipped="0">`,
    ...findings.map((finding) => claimCase(file, finding)),
    ...faults.map((fault) => faultCase(file, fault)),
    "  </testsuite>",
  ].join("\n");
  return { tests, failures, errors, xml };
}

function claimCase(file: string, finding: Finding): string {
  const { ref, quantity, claimed, verdict, reason, slips, place } = finding;
  const line = place ? ` line="${place.line}"` : "";
  const open = `    <testcase classname="${escape(file)}" name="${escape(`${ref}: ${quantity} = ${claimed}`)}" file="${escape(file)}"${line}`;
  if (verdict === "confirmed") return `${open}/>`;
  const details = [
    reason,
    ...slips.map((slip) => `${slip.certainty === "likely" ? "Likely" : "Possibly"}: ${slip.says}`),
  ];
  if (isConfirmed(verdict)) {
    return `${open}>\n      <system-out>${escape(details.join("\n"))}</system-out>\n    </testcase>`;
  }
  const element = verdict === "discrepant" || verdict === "contradicted" ? "failure" : "error";
  return `${open}>\n      <${element} type="${verdict}" message="${escape(reason)}">${escape(details.join("\n"))}</${element}>\n    </testcase>`;
}

function faultCase(file: string, { line, column, says }: FileFault): string {
  return [
    `    <testcase classname="${escape(file)}" name="${escape(`line ${line}, column ${column}`)}" file="${escape(file)}" line="${line}">`,
    `      <error type="file" message="${escape(says)}"/>`,
    "    </testcase>",
  ].join("\n");
}

/** Text as XML 1.0 allows it: markup escaped, characters that XML forbids spelt out. */
function escape(text: string): string {
  const named: Record<string, string> = {
    "&": "&amp;",
    "<": "&lt;",
    ">": "&gt;",
    '"': "&quot;",
    "\n": "&#10;",
    "\t": "&#9;",
    "\r": "&#13;",
  };
  const forbidden =
    /[\u0000-\u0008\u000b\u000c\u000e-\u001f\ufffe\uffff]|[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]/g;
  return text
    .replace(forbidden, (c) => `\\u${c.charCodeAt(0).toString(16).padStart(4, "0")}`)
    .replace(/[&<>"\n\t\r]/g, (c) => named[c] ?? c);
}
