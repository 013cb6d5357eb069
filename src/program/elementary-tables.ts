/**
 * The constants of `elementary.ts`, as plain numbers so that a compiler to another target can read this very file.
 *
 * The fitted ones are interpolants through points where the errors come out nearly level (within a small factor of the
 * best possible), solved in 60-digit arithmetic and rounded once to doubles; `make-elementary-oracle.py tables`, beside the test,
 * prints them again. Ascending powers: the digit at the end of a name is the power it multiplies.
 */

/** log 2 cut after 32 binary digits, so that its product with any exponent of a double is exact; then the rest. */
export const logOfTwoHigh = 0.6931471803691238;
export const logOfTwoLow = 1.9082149292705877e-10;
// biome-ignore lint/suspicious/noApproximativeNumericConstant: these digits, and no engine's, decide the results.
export const oneOverLogOfTwo = 1.4426950408889634;

/** (exp(r) - 1 - r) / r^2 on |r| <= log(2) / 2; relative error of exp(r) from the fit 1.1e-17. */
export const exponential0 = 0.5000000000000013;
export const exponential1 = 0.16666666666666677;
export const exponential2 = 0.04166666666651443;
export const exponential3 = 0.008333333333321626;
export const exponential4 = 0.001388888894722041;
export const exponential5 = 0.00019841269886129465;
export const exponential6 = 2.4801489767637953e-5;
export const exponential7 = 2.7557244214044647e-6;
export const exponential8 = 2.7631333000216065e-7;
export const exponential9 = 2.5109032783640228e-8;

/** (log((1 + s) / (1 - s)) / s - 2) / s^2 in powers of s^2, for (1 + s) / (1 - s) from sqrt(1/2) to sqrt(2): 4.6e-18. */
export const logarithm0 = 0.666666666666667;
export const logarithm1 = 0.39999999999899505;
export const logarithm2 = 0.28571428625975487;
export const logarithm3 = 0.2222221113479508;
export const logarithm4 = 0.18182889125261723;
export const logarithm5 = 0.15331721600556042;
export const logarithm6 = 0.14616449685043406;

/**
 * exp(a^2 / 2) * Phi(-a) on 0 <= a <= 39 as numerator / denominator, exactly 1/2 at 0; relative error 1.9e-16
 * with the coefficients as rounded.
 * All coefficients are positive: nothing cancels, and one formula serves the whole range.
 */
export const tailNumerator0 = 0.5;
export const tailNumerator1 = 0.7656496395590044;
export const tailNumerator2 = 0.5805392392288243;
export const tailNumerator3 = 0.2795939662289245;
export const tailNumerator4 = 0.09328701090276117;
export const tailNumerator5 = 0.02226101168470956;
export const tailNumerator6 = 0.0037970349244756444;
export const tailNumerator7 = 0.00044763976590371805;
export const tailNumerator8 = 3.3314453770856997e-5;
export const tailNumerator9 = 1.2071850620998388e-6;
export const tailDenominator1 = 2.329183839920874;
export const tailDenominator2 = 2.5194983036020515;
export const tailDenominator3 = 1.6708263301779778;
export const tailDenominator4 = 0.7544246776862759;
export const tailDenominator5 = 0.24318658408523205;
export const tailDenominator6 = 0.056916096486857914;
export const tailDenominator7 = 0.009601262036708268;
export const tailDenominator8 = 0.0011250924585748123;
export const tailDenominator9 = 8.350695177260868e-5;
export const tailDenominator10 = 3.0259642093879305e-6;

/**
 * Algorithm AS 241, routine PPND16: Wichura, M. J. (1988), The percentage points of the normal distribution, Applied
 * Statistics 37, 477-484. The published 20 digits, written from memory, rounded to doubles here; what they give was
 * compared with 60-digit quantiles: relative error at most 1.8e-16 in every part.
 * Middle: |p - 1/2| <= 0.425, in 0.180625 - (p - 1/2)^2.
 */
export const middleNumerator0 = 3.3871328727963665;
export const middleNumerator1 = 133.14166789178438;
export const middleNumerator2 = 1971.5909503065513;
export const middleNumerator3 = 13731.69376550946;
export const middleNumerator4 = 45921.95393154987;
export const middleNumerator5 = 67265.7709270087;
export const middleNumerator6 = 33430.57558358813;
export const middleNumerator7 = 2509.0809287301227;
export const middleDenominator1 = 42.31333070160091;
export const middleDenominator2 = 687.1870074920579;
export const middleDenominator3 = 5394.196021424751;
export const middleDenominator4 = 21213.794301586597;
export const middleDenominator5 = 39307.89580009271;
export const middleDenominator6 = 28729.085735721943;
export const middleDenominator7 = 5226.495278852854;

/** Outer: with root = sqrt(-log(the smaller of p and 1 - p)) <= 5, in root - 1.6. */
export const outerNumerator0 = 1.4234371107496835;
export const outerNumerator1 = 4.630337846156546;
export const outerNumerator2 = 5.769497221460691;
export const outerNumerator3 = 3.6478483247632045;
export const outerNumerator4 = 1.2704582524523684;
export const outerNumerator5 = 0.2417807251774506;
export const outerNumerator6 = 0.022723844989269184;
export const outerNumerator7 = 0.0007745450142783414;
export const outerDenominator1 = 2.053191626637759;
export const outerDenominator2 = 1.6763848301838038;
export const outerDenominator3 = 0.6897673349851;
export const outerDenominator4 = 0.14810397642748008;
export const outerDenominator5 = 0.015198666563616457;
export const outerDenominator6 = 0.0005475938084995345;
export const outerDenominator7 = 1.0507500716444169e-9;

/** Far: root > 5, in root - 5. */
export const farNumerator0 = 6.657904643501103;
export const farNumerator1 = 5.463784911164114;
export const farNumerator2 = 1.7848265399172913;
export const farNumerator3 = 0.29656057182850487;
export const farNumerator4 = 0.026532189526576124;
export const farNumerator5 = 0.0012426609473880784;
export const farNumerator6 = 2.7115555687434876e-5;
export const farNumerator7 = 2.0103343992922881e-7;
export const farDenominator1 = 0.599832206555888;
export const farDenominator2 = 0.1369298809227358;
export const farDenominator3 = 0.014875361290850615;
export const farDenominator4 = 0.0007868691311456133;
export const farDenominator5 = 1.8463183175100548e-5;
export const farDenominator6 = 1.421511758316446e-7;
export const farDenominator7 = 2.0442631033899397e-15;
