import { readFile } from "node:fs/promises";

/**
 * NHANES 2009–2010 extract: public-use data of the United States government, as carried by the R package `survey`
 * (`survey::nhanes`); tests/reference holds the file.
 */
export const readNhanes = (): Promise<string> => readFile(new URL("../reference/nhanes.csv", import.meta.url), "utf8");

/** What a steward would write of it. */
export const NHANES_CODEBOOK = `variable,label,kind,code,category label,missing
SDMVPSU,Masked variance PSU,categorical,,,
SDMVPSU,,,1,1,
SDMVPSU,,,2,2,
SDMVPSU,,,3,3,
SDMVSTRA,Masked variance stratum,numeric,,,
WTMEC2YR,Examination weight,numeric,,,
HI_CHOL,Total cholesterol of 240 mg/dL or more,categorical,,,
HI_CHOL,,,0,No,
HI_CHOL,,,1,Yes,
race,Race and ethnicity,categorical,,,
race,,,1,Hispanic,
race,,,2,Non-Hispanic white,
race,,,3,Non-Hispanic black,
race,,,4,Other,
agecat,Age,categorical,,,
agecat,,,1,Under 20,
agecat,,,2,20 to 39,
agecat,,,3,40 to 59,
agecat,,,4,60 and over,
RIAGENDR,Sex,categorical,,,
RIAGENDR,,,1,Men,
RIAGENDR,,,2,Women,
`;

export const NHANES_DESIGN = { weight: "WTMEC2YR", strata: "SDMVSTRA", psu: "SDMVPSU" };
