import type { ModelSpec } from '../core/model/spec';
import { ResultsCache, type SpecKey, keyOf } from './cache';
import { checkSymbolic, withResults } from './check';
import type { CheckedDocument } from './checked';
import { brokenDown } from './evaluate';
import type { Evaluator, Outcome } from './evaluator';
import { type Settings, standardSettings } from './settings';

export interface SessionEvents {
  /** More is known of a document: first by power counting, then with each model that has been evaluated. */
  checked(uri: string, version: number, document: CheckedDocument): void;
  /** What is being evaluated, `done` from 0 to 1; null when there is nothing left to do. */
  working(state: { readonly model: string; readonly done: number; readonly what: string } | null): void;
}

interface OpenDocument {
  readonly uri: string;
  readonly version: number;
  readonly text: string;
  /** Null until this version of the text has been read. */
  checked: CheckedDocument | null;
  timer?: NodeJS.Timeout;
  /** What reading the last version took, and when that was over, in ms. */
  cost: number;
  readAt: number;
}

/**
 * The first edit is read at once; one that follows sooner than this after a reading waits for as long as that reading took, so that
 * a burst of keystrokes in a huge file is read once; but never longer than this, in ms.
 */
const longestWait = 50;

const nothingOverridden = { cutoff: null, order: null };

/**
 * The open documents and what is known of them. Each edit is answered with verdicts at once; models whose numbers are not known yet
 * are then evaluated one after the other, those of the document edited last first. Results go by what a model says, not by version:
 * an edit that leaves a model as it is costs it nothing, and a result that no open document asks for is published nowhere.
 */
export class Scheduler {
  /** In the order of their last edit. */
  private readonly documents = new Map<string, OpenDocument>();
  private readonly cache = new ResultsCache();
  private settings = standardSettings;
  private evaluating: SpecKey | null = null;

  constructor(
    private readonly evaluator: Pick<Evaluator, 'evaluate' | 'cancel' | 'dispose'>,
    private readonly events: SessionEvents,
  ) {}

  /** A document was opened or edited. */
  update(uri: string, version: number, text: string): void {
    const before = this.documents.get(uri);
    clearTimeout(before?.timer);
    this.documents.delete(uri);
    const document: OpenDocument = { uri, version, text, checked: null, cost: before?.cost ?? 0, readAt: before?.readAt ?? -Infinity };
    const isBurst = performance.now() - document.readAt < longestWait;
    document.timer = setTimeout(() => this.check(document), isBurst ? Math.min(document.cost, longestWait) : 0);
    this.documents.set(uri, document);
  }

  close(uri: string): void {
    clearTimeout(this.documents.get(uri)?.timer);
    this.documents.delete(uri);
    this.evaluateNext();
  }

  /** Checks every document anew under other settings. */
  configure(settings: Settings): void {
    if (settings.keystrokeBudget !== this.settings.keystrokeBudget) {
      this.cache.complete.clear();
      this.evaluator.cancel();
    }
    this.settings = settings;
    for (const { uri, version, text } of [...this.documents.values()]) this.update(uri, version, text);
  }

  /** What is known now of the latest text of a document; null where it is not open. */
  current(uri: string): CheckedDocument | null {
    const document = this.documents.get(uri);
    return document ? (document.checked ?? this.check(document)) : null;
  }

  dispose(): void {
    for (const document of this.documents.values()) clearTimeout(document.timer);
    this.documents.clear();
    this.evaluator.dispose();
  }

  private check(document: OpenDocument): CheckedDocument {
    clearTimeout(document.timer);
    const start = performance.now();
    const checked = checkSymbolic(document.text, this.settings.defaults, nothingOverridden, this.cache);
    document.readAt = performance.now();
    document.cost = document.readAt - start;
    this.publish(document, checked);
    this.evaluateNext();
    return checked;
  }

  private publish(document: OpenDocument, checked: CheckedDocument): void {
    document.checked = checked;
    this.events.checked(document.uri, document.version, checked);
  }

  private evaluateNext(): void {
    const wanted = this.wantedModels();
    if (this.evaluating !== null) {
      if (!wanted.has(this.evaluating)) this.evaluator.cancel();
      return;
    }
    const next = wanted.entries().next().value;
    if (!next) return this.events.working(null);
    const [key, spec] = next;
    this.evaluating = key;
    const working = (done: number, what: string): void => this.events.working({ model: spec.name, done, what });
    working(0, '');
    void this.evaluator.evaluate(spec, this.settings.keystrokeBudget, working).then(outcome => this.conclude(key, spec, outcome));
  }

  private conclude(key: SpecKey, spec: ModelSpec, outcome: Outcome): void {
    this.evaluating = null;
    if (outcome.kind !== 'cancelled') {
      const results = outcome.kind === 'finished' ? outcome.results : brokenDown(spec, outcome.reason);
      this.cache.complete.set(key, results);
      for (const document of this.documents.values()) {
        const { checked } = document;
        if (checked && unfinished(checked).has(key)) this.publish(document, withResults(checked, key, results));
      }
    }
    this.evaluateNext();
  }

  private wantedModels(): Map<SpecKey, ModelSpec> {
    const wanted = new Map<SpecKey, ModelSpec>();
    for (const { checked } of [...this.documents.values()].reverse()) {
      if (checked) for (const [key, spec] of unfinished(checked)) wanted.set(key, spec);
    }
    return wanted;
  }
}

/** The models of a document whose numbers are not known yet. */
function unfinished(document: CheckedDocument): Map<SpecKey, ModelSpec> {
  const models = new Map<SpecKey, ModelSpec>();
  for (const { source, stage } of document.models) {
    if (stage === 'symbolic' && source.spec) models.set(keyOf(source.spec), source.spec);
  }
  return models;
}
