"""The document as typed, its schema, and the way from text to parts."""
