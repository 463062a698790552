"""Random loop nests: their C++, what they touch by walking them, and by an exact count where they are affine."""
