//! Decides what to draw back onto the plan; knows nothing of DXF.
