import { DefaultNamingStrategy, Table } from 'typeorm';

function snake(name: string): string {
  return name.replace(/([a-z0-9])([A-Z])/g, '$1_$2').toLowerCase();
}

function tableOf(table: Table | string): string {
  const name = typeof table === 'string' ? table : table.name;
  return name.split('.').at(-1) ?? name;
}

function named(prefix: string, table: Table | string, columns: readonly string[]): string {
  // PostgreSQL cuts identifiers at 63 bytes; a cut name would make the schema diff non-empty.
  return `${prefix}_${tableOf(table)}_${columns.map(snake).join('_')}`.slice(0, 63);
}

/** Snake case for tables and columns, and a readable, stable name for every constraint and index. */
export class NamingStrategy extends DefaultNamingStrategy {
  override tableName(targetName: string, userSpecifiedName: string | undefined): string {
    return userSpecifiedName ?? snake(targetName);
  }
  override columnName(propertyName: string, customName: string, prefixes: string[]): string {
    return [...prefixes.map(snake), customName || snake(propertyName)].join('_');
  }
  override joinColumnName(relationName: string, referencedColumnName: string): string {
    return `${snake(relationName)}_${snake(referencedColumnName)}`;
  }
  override primaryKeyName(table: Table | string, _columns: string[]): string {
    return `pk_${tableOf(table)}`;
  }
  override foreignKeyName(table: Table | string, columns: string[]): string {
    return named('fk', table, columns);
  }
  override uniqueConstraintName(table: Table | string, columns: string[]): string {
    return named('uq', table, columns);
  }
  override indexName(table: Table | string, columns: string[], where?: string): string {
    return named(where ? 'ixw' : 'ix', table, columns);
  }
  override checkConstraintName(table: Table | string, expression: string): string {
    return named('ck', table, [expression.replace(/[^a-zA-Z]+/g, '_')]);
  }
}
