//! The places of the 57 selected stars and Polaris.
//!
//! Made from `fixtures/published/nav_stars.csv` (SHA-256 d4fc00e421b50b9e803617cabebda0b9da834a19b56556bc341e3075b6557396); a test
//! compares the two. Source: Hipparcos, new reduction (van Leeuwen 2007, CDS I/311), brought from 1991.25 to 2000.0 with no
//! radial velocity; V from the main catalogue (CDS I/239); numbers and Bayer names from memory.

/// One star: ICRS at the epoch J2000.0.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Entry {
    /// Common name.
    pub name: &'static str,
    /// Bayer's name.
    pub bayer: &'static str,
    /// Number in the Hipparcos catalogue.
    #[cfg(test)]
    pub hip: u32,
    /// Right ascension, degrees.
    pub ra_deg: f64,
    /// Declination, degrees.
    pub dec_deg: f64,
    /// Proper motion in right ascension times cos(declination), milliseconds of arc a year.
    pub pm_ra_mas: f64,
    /// Proper motion in declination, milliseconds of arc a year.
    pub pm_dec_mas: f64,
    /// Parallax, milliseconds of arc.
    pub parallax_mas: f64,
    /// Visual magnitude.
    pub vmag: f64,
}

macro_rules! star {
    ($name:literal, $bayer:literal, $hip:literal, $ra:literal, $dec:literal, $pm_ra:literal, $pm_dec:literal, $parallax:literal, $vmag:literal) => {
        Entry {
            name: $name,
            bayer: $bayer,
            #[cfg(test)]
            hip: $hip,
            ra_deg: $ra,
            dec_deg: $dec,
            pm_ra_mas: $pm_ra,
            pm_dec_mas: $pm_dec,
            parallax_mas: $parallax,
            vmag: $vmag,
        }
    };
}

/// In the almanac's order, Polaris last.
#[rustfmt::skip]
pub(super) const STARS: [Entry; 58] = [
    star!("Alpheratz", "alpha And", 677, 2.0969162, 29.0904311, 137.46, -163.44, 33.62, 2.07),
    star!("Ankaa", "alpha Phe", 2081, 6.5710475, -42.3059872, 233.05, -356.30, 38.50, 2.40),
    star!("Schedar", "alpha Cas", 3179, 10.1268378, 56.5373312, 50.88, -32.13, 14.29, 2.24),
    star!("Diphda", "beta Cet", 3419, 10.8973787, -17.9866063, 232.55, 31.99, 33.86, 2.04),
    star!("Achernar", "alpha Eri", 7588, 24.4285228, -57.2367528, 87.00, -38.24, 23.39, 0.45),
    star!("Hamal", "alpha Ari", 9884, 31.7933571, 23.4624176, 188.55, -148.08, 49.56, 2.01),
    star!("Acamar", "theta-1 Eri", 13847, 44.5653136, -40.3046812, -52.89, 21.98, 20.23, 2.88),
    star!("Menkar", "alpha Cet", 14135, 45.5698878, 4.0897388, -10.41, -76.85, 13.09, 2.54),
    star!("Mirfak", "alpha Per", 15863, 51.0807087, 49.8611793, 23.75, -26.23, 6.44, 1.79),
    star!("Aldebaran", "alpha Tau", 21421, 68.9801628, 16.5093024, 63.45, -188.94, 48.94, 0.87),
    star!("Rigel", "beta Ori", 24436, 78.6344671, -8.2016384, 1.31, 0.50, 3.78, 0.18),
    star!("Capella", "alpha Aur", 24608, 79.1723279, 45.9979915, 75.25, -426.89, 76.20, 0.08),
    star!("Bellatrix", "gamma Ori", 25336, 81.2827636, 6.3497033, -8.11, -12.88, 12.92, 1.64),
    star!("Elnath", "beta Tau", 25428, 81.5729713, 28.6074517, 22.76, -173.58, 24.36, 1.65),
    star!("Alnilam", "epsilon Ori", 26311, 84.0533889, -1.2019191, 1.44, -0.78, 1.65, 1.69),
    star!("Betelgeuse", "alpha Ori", 27989, 88.7929390, 7.4070640, 27.54, 11.30, 6.55, 0.45),
    star!("Canopus", "alpha Car", 30438, 95.9879578, -52.6956614, 19.93, 23.24, 10.55, -0.62),
    star!("Sirius", "alpha CMa", 32349, 101.2871554, -16.7161158, -546.02, -1223.07, 379.21, -1.44),
    star!("Adhara", "epsilon CMa", 33579, 104.6564531, -28.9720862, 3.24, 1.33, 8.05, 1.50),
    star!("Procyon", "alpha CMi", 37279, 114.8254979, 5.2249876, -714.59, -1036.80, 284.56, 0.40),
    star!("Pollux", "beta Gem", 37826, 116.3289578, 28.0261989, -626.55, -45.81, 96.54, 1.16),
    star!("Avior", "epsilon Car", 41037, 125.6284802, -59.5094842, -25.52, 22.06, 5.39, 1.86),
    star!("Suhail", "lambda Vel", 44816, 136.9989911, -43.4325909, -24.01, 13.52, 5.99, 2.23),
    star!("Miaplacidus", "beta Car", 45238, 138.2999061, -69.7172076, -156.47, 108.95, 28.82, 1.67),
    star!("Alphard", "alpha Hya", 46390, 141.8968446, -8.6585995, -15.23, 34.37, 18.09, 1.99),
    star!("Regulus", "alpha Leo", 49669, 152.0929624, 11.9672088, -248.73, 5.59, 41.13, 1.36),
    star!("Dubhe", "alpha UMa", 54061, 165.9319647, 61.7510347, -134.11, -34.70, 26.54, 1.81),
    star!("Denebola", "beta Leo", 57632, 177.2649098, 14.5720581, -497.68, -114.67, 90.91, 2.14),
    star!("Gienah", "gamma Crv", 59803, 183.9515450, -17.5419305, -158.61, 21.86, 21.23, 2.58),
    star!("Acrux", "alpha-1 Cru", 60718, 186.6495634, -63.0990929, -35.83, -14.86, 10.13, 0.77),
    star!("Gacrux", "gamma Cru", 61084, 187.7914984, -57.1132135, 28.23, -265.08, 36.83, 1.59),
    star!("Alioth", "epsilon UMa", 62956, 193.5072900, 55.9598230, 111.91, -8.24, 39.51, 1.76),
    star!("Spica", "alpha Vir", 65474, 201.2982474, -11.1613195, -42.35, -30.67, 13.06, 0.98),
    star!("Alkaid", "eta UMa", 67301, 206.8851573, 49.3132667, -121.17, -14.91, 31.38, 1.85),
    star!("Hadar", "beta Cen", 68702, 210.9558556, -60.3730352, -33.27, -23.16, 8.32, 0.61),
    star!("Menkent", "theta Cen", 68933, 211.6706147, -36.3699547, -520.54, -518.05, 55.45, 2.06),
    star!("Arcturus", "alpha Boo", 69673, 213.9153003, 19.1824092, -1093.36, -2000.08, 88.83, -0.05),
    star!("Rigil Kentaurus", "alpha Cen A", 71683, 219.9020583, -60.8339927, -3679.12, 474.70, 754.81, -0.01),
    star!("Zubenelgenubi", "alpha-2 Lib", 72622, 222.7196379, -16.0417765, -105.68, -68.40, 43.03, 2.75),
    star!("Kochab", "beta UMi", 72607, 222.6763575, 74.1555039, -32.61, 11.42, 24.91, 2.07),
    star!("Alphecca", "alpha CrB", 76267, 233.6719500, 26.7146928, 120.27, -89.58, 43.46, 2.22),
    star!("Antares", "alpha Sco", 80763, 247.3519154, -26.4320026, -12.11, -23.30, 5.89, 1.06),
    star!("Atria", "alpha TrA", 82273, 252.1662295, -69.0277118, 17.99, -31.58, 8.35, 1.91),
    star!("Sabik", "eta Oph", 84012, 257.5945287, -15.7249066, 40.13, 99.17, 36.91, 2.43),
    star!("Shaula", "lambda Sco", 85927, 263.4021672, -37.1038235, -8.53, -30.80, 5.71, 1.62),
    star!("Rasalhague", "alpha Oph", 86032, 263.7336227, 12.5600374, 108.07, -221.57, 67.13, 2.08),
    star!("Eltanin", "gamma Dra", 87833, 269.1515412, 51.4888956, -8.48, -22.79, 21.14, 2.24),
    star!("Kaus Australis", "epsilon Sgr", 90185, 276.0429933, -34.3846165, -39.42, -124.20, 22.76, 1.79),
    star!("Vega", "alpha Lyr", 91262, 279.2347348, 38.7836890, 200.94, 286.23, 130.23, 0.03),
    star!("Nunki", "sigma Sgr", 92855, 283.8163604, -26.2967241, 15.14, -53.43, 14.32, 2.05),
    star!("Altair", "alpha Aql", 97649, 297.6958273, 8.8683212, 536.23, 385.29, 194.95, 0.76),
    star!("Peacock", "alpha Pav", 100751, 306.4119044, -56.7350897, 6.90, -86.02, 18.24, 1.94),
    star!("Deneb", "alpha Cyg", 102098, 310.3579798, 45.2803388, 2.01, 1.85, 2.31, 1.25),
    star!("Enif", "epsilon Peg", 107315, 326.0464839, 9.8750087, 26.92, 0.44, 4.73, 2.38),
    star!("Al Na'ir", "alpha Gru", 109268, 332.0582697, -46.9609744, 126.69, -147.47, 32.29, 1.73),
    star!("Fomalhaut", "alpha PsA", 113368, 344.4126927, -29.6222370, 328.95, -164.67, 129.81, 1.17),
    star!("Markab", "alpha Peg", 113963, 346.1902227, 15.2052671, 60.40, -41.30, 24.46, 2.49),
    star!("Polaris", "alpha UMi", 11767, 37.9545607, 89.2641090, 44.48, -11.86, 7.54, 1.97),
];
