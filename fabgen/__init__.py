"""Construction models and fabrication drawings for Yagi-type arrays, from one design file."""

__version__ = "0.1.0"
