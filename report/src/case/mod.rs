//! Case files: the schema, reading with errors that point at the line, the JSON Schema for editors.
