// Exports of the generators group of kernels.
