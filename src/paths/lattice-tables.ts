/**
 * The generating vector of the lattices that inner points are taken from: point i of N = 2^m lies at i z / N, less the whole
 * part. Made by this project's own construction, `test/paths/lattice-construction.ts`, which the tests run again.
 *
 * Component by component each number is the odd one below 2^10 (a number and its opposite give mirrored lattices) for which
 * the largest ratio, over m = 4 … 11, of the squared worst-case error to that of the vector made for m alone is least.
 * The ratio is at most 1.59 (three dimensions) and 1.01 with 40 and more. Errors are those of the weighted Korobov space of
 * smoothness 2, kernel 1 + γ 2π² B₂(x), with γ = 1/32 for every dimension. Weights that fall, 1/j² and 1/j, were tried and
 * are worse: with ten lots and 1,024 points, 1/j gave inner means of 2.5 to 6.5 times the variance. Drivers come in no order
 * of importance, and what is left to the points is their interplay in pairs. The numbers would repeat from 224 on. Whole:
 * nothing is rounded.
 *
 * @source Sloan & Reztsov (2002), Mathematics of Computation 71, 263-273 (component by component); Cools, Kuo & Nuyens
 *   (2006), SIAM J. Sci. Comput. 28, 2162-2188 (one vector for every power of two, least largest ratio)
 */
// biome-ignore format: a table
export const generatingVector: readonly number[] = [
  1, 807, 467, 303, 445, 203, 119, 859, 133, 947, 761, 227, 183, 159, 719, 983, 959, 919, 245, 125,
  1005, 619, 791, 785, 537, 741, 753, 545, 427, 733, 555, 69, 75, 973, 293, 567, 521, 953, 95, 339,
  827, 877, 259, 389, 605, 277, 371, 169, 613, 965, 145, 707, 781, 117, 153, 27, 1019, 903, 57, 79,
  167, 849, 993, 541, 163, 43, 933, 701, 321, 111, 231, 83, 759, 257, 897, 187, 813, 925, 201, 799,
  275, 261, 515, 309, 987, 809, 875, 327, 47, 547, 431, 319, 845, 505, 951, 341, 385, 867, 397, 49,
  369, 1011, 11, 915, 637, 717, 357, 689, 409, 15, 423, 381, 961, 725, 377, 629, 181, 573, 97, 491,
  17, 223, 939, 625, 937, 663, 787, 651, 883, 359, 525, 205, 581, 587, 267, 675, 645, 195, 315, 723,
  1021, 659, 455, 523, 595, 475, 115, 611, 21, 851, 93, 219, 565, 803, 621, 579, 139, 155, 895, 393,
  273, 281, 711, 255, 497, 671, 773, 143, 687, 691, 297, 923, 535, 67, 539, 177, 837, 735, 739, 213,
  439, 135, 355, 661, 29, 165, 61, 249, 737, 839, 343, 35, 53, 461, 197, 507, 199, 269, 471, 633,
];
