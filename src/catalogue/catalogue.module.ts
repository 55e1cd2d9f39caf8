import { Global, Module } from '@nestjs/common';
import type { AssessmentData } from '../assessment/assessment-data.js';
import { engineVersion } from '../assessment/engine-version.js';
import type { Catalogue } from '../assessment/catalogue-types.js';
import type { GasLibrary } from '../science/gases/gas-library.js';
import { loadCatalogue } from './catalogue.js';
import { loadGasLibrary } from './gas-library.js';

/** The data and words of `templates/`, read once. Also the token under which Nest hands them out. */
export class CatalogueData {
  /** The same with the name of the engine: what an assessment draws on. */
  readonly forAssessment: AssessmentData;

  constructor(
    readonly catalogue: Catalogue,
    readonly gases: GasLibrary,
  ) {
    this.forAssessment = Object.freeze({ catalogue, gases, engineVersion });
  }
}

/** Reads and checks the data at start-up: a broken file stops the start, not a request. */
@Global()
@Module({
  providers: [
    {
      provide: CatalogueData,
      useFactory: () => new CatalogueData(loadCatalogue(), loadGasLibrary()),
    },
  ],
  exports: [CatalogueData],
})
export class CatalogueModule {}
