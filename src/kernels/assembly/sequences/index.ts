// Exports of the sequences group of kernels.
