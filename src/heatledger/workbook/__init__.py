"""The only room that knows the file format: gate, reader, template, result sheets, graft."""
