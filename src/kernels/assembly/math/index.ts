// Exports of the math group of kernels.
