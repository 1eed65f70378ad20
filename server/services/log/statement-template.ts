import { statementTemplateCsv } from '../../importers/statement-template.ts';

/** The statement layout as a file to fill in. */
export function statementTemplate(): { fileName: string; contentType: string; body: string } {
  return {
    fileName: 'statement-template.csv',
    contentType: 'text/csv; charset=utf-8',
    body: statementTemplateCsv(),
  };
}
