//! Colour decided once, messages, escaping of text that came from a drawing.
