/** Å⁻¹, where nothing says how far the data go: beyond it the form factors of 3d and 4f ions leave little to see. */
export const usualQMax = 3;
