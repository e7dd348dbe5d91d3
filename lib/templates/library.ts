/** A row of question-templates/areas.yaml. */
export interface Area { area: string; title: string; order: number; caution: 'required' | 'none' }
/** A row of question-templates/cautions.yaml; `text` is Markdown. */
export interface Caution { caution: string; title: string; text: string }
export interface Column { unit?: string; label?: string; symbol?: string; decimals?: number }
/** A table of realistic machines: each row is one machine, so that its values belong together. */
export interface Table { table: string; title: string; note?: string; columns: Record<string, Column>; rows: (number | string)[][] }

/** What templates may refer to, as plain data. */
export interface Library {
  areas: Record<string, Area>;
  cautions: Record<string, Caution>;
  tables: Record<string, Table>;
}
