"""Views of an answer: figures, text, JSON, CSV, workings."""
