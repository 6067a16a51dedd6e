package org.merewarden.intake;

import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;

/** Describes the tables as Frictionless Table Schemas, and all of them as a Data Package (datapackage.org, 2.0). */
final class TableSchema {
    private TableSchema() {}

    static Map<String, Object> of(TableDefinition table) {
        Map<String, Object> schema = new LinkedHashMap<>();
        schema.put("$schema", "https://datapackage.org/profiles/2.0/tableschema.json");
        schema.put("name", table.name());
        schema.put("title", table.title());
        schema.put("fields", table.columns().stream().map(TableSchema::field).toList());
        schema.put("primaryKey", table.keys().stream().map(Column::name).toList());
        schema.put("missingValues", List.of(""));
        return schema;
    }

    static Map<String, Object> dataPackage(List<TableDefinition> tables) {
        Map<String, Object> all = new LinkedHashMap<>();
        all.put("$schema", "https://datapackage.org/profiles/2.0/datapackage.json");
        all.put("name", "merewarden-tables");
        all.put("resources", tables.stream().map(TableSchema::resource).toList());
        return all;
    }

    private static Map<String, Object> resource(TableDefinition table) {
        Map<String, Object> resource = new LinkedHashMap<>();
        resource.put("name", table.name());
        resource.put("path", table.name() + ".csv");
        resource.put("type", "table");
        resource.put("format", "csv");
        resource.put("encoding", "utf-8");
        resource.put("schema", of(table));
        return resource;
    }

    private static Map<String, Object> field(Column column) {
        Map<String, Object> field = new LinkedHashMap<>();
        field.put("name", column.name());
        field.put("type", type(column.kind()));
        field.put("description", column.description());
        if (column.defaultValue() != null && !column.defaultValue().isEmpty()) {
            // no word of the standard, which allows further properties
            field.put("default", column.defaultValue());
        }
        Map<String, Object> constraints = constraints(column);
        if (!constraints.isEmpty()) {
            field.put("constraints", constraints);
        }
        return field;
    }

    private static String type(Column.Kind kind) {
        return switch (kind) {
            case TEXT, CODE -> "string";
            case NUMBER -> "number";
            case INTEGER -> "integer";
            case YEAR -> "year";
            case DATE -> "date";
        };
    }

    private static Map<String, Object> constraints(Column column) {
        Map<String, Object> constraints = new LinkedHashMap<>();
        if (column.required() && column.defaultValue() == null) {
            constraints.put("required", true);
        }
        boolean text = column.kind() == Column.Kind.TEXT || column.kind() == Column.Kind.CODE;
        if (!column.choices().isEmpty()) {
            constraints.put("enum", column.choices());
        } else if (text) {
            constraints.put("maxLength", (int) column.max());
        } else {
            putBound(constraints, "minimum", column.min(), column.kind());
            putBound(constraints, "maximum", column.max(), column.kind());
        }
        return constraints;
    }

    private static void putBound(Map<String, Object> constraints, String name, double bound, Column.Kind kind) {
        if (Double.isFinite(bound)) {
            constraints.put(name, kind == Column.Kind.NUMBER ? (Object) bound : (Object) (long) bound);
        }
    }
}
