# Writes the tables of every case. All records are INVENTED but albacore's, which are published
# (Polacheck, Hilborn & Punt 1993, Can. J. Fish. Aquat. Sci. 50: 2597-2607).
#   Rscript simulate.R            from this folder; R alone. The same seed writes the same bytes.
# A stock is rolled forward under a given course of F by the closed form of Pella & Tomlinson's law under constant F,
# with process noise; catches, indices and effort are its true values with lognormal noise, rounded.

flow <- function(b, r, n, f, time) {
  a <- r - n * f
  (b^-n * exp(-a * time) + r * (1 - exp(-a * time)) / a)^(-1 / n)
}

course <- function(msy, fmsy, n, process, f, start, stocked = 0 * f) {
  r <- fmsy * (1 + n)
  k <- msy / fmsy * (1 + n)^(1 / n)
  b <- start
  out <- data.frame(f = f, biomass = NA, middle = NA, catch = NA)
  for (t in seq_along(f)) {
    b <- b + stocked[t] / k
    out$biomass[t] <- k * b
    out$middle[t] <- k * flow(b, r, n, f[t], 0.5)
    out$catch[t] <- f[t] * k * integrate(function(s) flow(b, r, n, f[t], s), 0, 1, rel.tol = 1e-10)$value
    b <- flow(b, r, n, f[t], 1) * exp(process * rnorm(1))
  }
  out
}

noisy <- function(value, sd) signif(value * exp(sd * rnorm(length(value))), 4)

write_table <- function(case, table, rows) {
  dir.create(case, showWarnings = FALSE)
  write.csv(rows, file.path(case, paste0(table, ".csv")), row.names = FALSE, quote = FALSE, na = "", eol = "\n")
}

stock <- function(case, water, species, name) {
  write_table(case, "water-bodies", data.frame(code = water, name = name, kind = "lake", area_ha = 2000))
  write_table(case, "stocks", data.frame(water_body = water, species = species))
  function(table, ...) write_table(case, table, data.frame(water_body = water, ..., check.names = FALSE))
}

priors <- function(put, species, extra = NULL, shape = c(1, 0), msy = c(30, 0.7), fmsy = c(0.2, 0.4)) {
  rows <- rbind(
    data.frame(parameter = "msy_t", series = "", median = msy[1], log_sd = msy[2]),
    data.frame(parameter = "fmsy", series = "", median = fmsy[1], log_sd = fmsy[2]),
    data.frame(parameter = "biomass_fraction_at_start", series = "", median = 0.8, log_sd = 0.3),
    data.frame(parameter = "process_sd", series = "", median = 0.1, log_sd = 0.4),
    data.frame(parameter = "harvest_sd", series = "", median = 0.3, log_sd = 0.5),
    data.frame(parameter = "first_harvest_rate", series = "", median = 0.15, log_sd = 1),
    data.frame(parameter = "shape", series = "", median = shape[1], log_sd = shape[2]),
    extra)
  put("priors", species = species, rows, reason = "states every prior of this check")
}

# sigma of a series, and its q free of units: index over half of K at the prior medians (300 t); effort against F 0.15
series_priors <- function(series, values, effort = FALSE, halfK = 150) {
  middle <- exp(mean(log(values)))
  rbind(
    data.frame(parameter = "observation_sd", series = series, median = 0.2, log_sd = 0.4),
    data.frame(parameter = "catchability", series = series,
      median = signif(if (effort) 0.15 / middle else middle / halfK, 4), log_sd = 5))
}

albacore <- function() {
  rows <- read.csv("../../resources/reference/series_south_atlantic_albacore.csv")
  water <- "south-atlantic"
  write_table("albacore", "water-bodies", data.frame(code = water, name = "South Atlantic", kind = "lake", area_ha = 2000))
  write_table("albacore", "stocks", data.frame(water_body = water, species = "ALB"))
  write_table("albacore", "catches", data.frame(
    water_body = water, species = "ALB", year = rows[[1]], sector = "commercial", catch_t = rows[[2]], cv = 0.1))
  write_table("albacore", "surveys", data.frame(
    water_body = water, species = "ALB", year = rows[[1]], series = "longline", time_of_year = 0, kind = "index",
    value = rows[[3]], cv = ""))
  write_table("albacore", "priors", data.frame(
    water_body = water, species = "ALB",
    parameter = c("msy_t", "fmsy", "biomass_fraction_at_start", "process_sd", "observation_sd", "harvest_sd",
      "first_harvest_rate", "shape", "catchability"),
    series = "", median = c(23, 0.175, 0.9, 0.1, 0.2, 0.3, 0.12, 1, 1),
    log_sd = c(0.8, 0.5, 0.25, 0.4, 0.4, 0, 0.8, 0, 2), reason = "states every prior of this check"))
}

gaps <- function() {
  set.seed(101)
  year <- 1995:2019
  f <- c(seq(0.08, 0.35, length.out = 15), seq(0.32, 0.15, length.out = 10)) * exp(0.15 * rnorm(25))
  true <- course(25, 0.22, 1, 0.1, f, 0.85)
  put <- stock("gaps", "invented-one", "FPP", "Invented Lake One")
  put("catches", species = "FPP", year = year, sector = "commercial", catch_t = noisy(true$catch, 0.15), cv = 0.15)
  seen <- c(2, 5, 6, 11, 15, 18, 19, 24)
  index <- noisy(0.02 * true$middle[seen], 0.2)
  put("surveys", species = "FPP", year = year[seen], series = "nets", time_of_year = 0.5, kind = "index", value = index, cv = "")
  priors(put, "FPP", series_priors("nets", index))
}

two_indices <- function() {
  set.seed(102)
  year <- 1995:2019
  f <- c(seq(0.1, 0.4, length.out = 12), rep(0.2, 13)) * exp(0.2 * rnorm(25))
  true <- course(35, 0.2, 1, 0.1, f, 0.8)
  put <- stock("two-indices", "invented-two", "FPE", "Invented Lake Two")
  put("catches", species = "FPE", year = year, sector = "commercial", catch_t = noisy(true$catch, 0.1), cv = 0.1)
  nets <- noisy(0.05 * true$middle[1:18], 0.25)
  sonar <- noisy(1.3 * true$biomass[11:25], 0.15)
  put("surveys", species = "FPE", rbind(
    data.frame(year = year[1:18], series = "nets", time_of_year = 0.5, kind = "index", value = nets, cv = ""),
    data.frame(year = year[11:25], series = "sonar", time_of_year = 0, kind = "index", value = sonar, cv = "0.1")))
  priors(put, "FPE", rbind(series_priors("nets", nets), series_priors("sonar", sonar)))
}

catch_only <- function() {
  set.seed(103)
  year <- 1995:2019
  f <- c(seq(0.06, 0.4, length.out = 16), seq(0.36, 0.25, length.out = 9)) * exp(0.15 * rnorm(25))
  true <- course(28, 0.2, 1, 0.1, f, 0.85)
  put <- stock("catch-only", "invented-three", "FBM", "Invented Lake Three")
  put("catches", species = "FBM", year = year, sector = "commercial", catch_t = noisy(true$catch, 0.1), cv = 0.1)
  priors(put, "FBM")
}

marked <- function() {
  put <- stock("marked", "invented-four", "FPI", "Invented Lake Four")
  put("surveys", species = "FPI", year = 2018, series = "marked", time_of_year = 0.5, kind = "biomass", value = 180, cv = 0.25)
  priors(put, "FPI")
}

closed_stocked <- function() {
  set.seed(106)
  year <- 1997:2018
  closed <- year %in% c(2007, 2008, 2009)
  none <- year == 2013
  f <- c(seq(0.15, 0.5, length.out = 10), rep(0.18, 12)) * exp(0.2 * rnorm(22))
  f[closed | none] <- 0
  stocking <- data.frame(year = c(2004, 2005, 2006, 2010), number = c(40000, 60000, 60000, 50000), survival = 0.3,
    delay_years = c(2, 2, 3, 1), recruit_weight_kg = 0.8)
  stocked <- 0 * f
  for (i in seq_len(nrow(stocking))) {
    t <- stocking$year[i] + stocking$delay_years[i] - year[1] + 1
    stocked[t] <- stocked[t] + stocking$number[i] * stocking$survival[i] * stocking$recruit_weight_kg[i] / 1000
  }
  true <- course(26, 0.2, 1, 0.1, f, 0.8, stocked)
  put <- stock("closed-stocked", "invented-five", "FPP", "Invented Lake Five")
  put("catches", species = "FPP", year = year[!closed], sector = "commercial",
    catch_t = ifelse(none, 0, noisy(true$catch, 0.1))[!closed], cv = 0.1)
  nets <- noisy(0.03 * true$middle, 0.2)
  put("surveys", species = "FPP", year = year, series = "nets", time_of_year = 0.5, kind = "index", value = nets, cv = "")
  open <- f > 0
  boats <- noisy(f[open] / 0.004, 0.15)
  put("effort", species = "FPP", year = year[open], series = "boats", effort = boats, unit = "boat days")
  events <- rbind(
    data.frame(key = paste0("s", 1:4), year = stocking$year, kind = "stocking", number = stocking$number,
      survival = stocking$survival, delay_years = stocking$delay_years, recruit_weight_kg = stocking$recruit_weight_kg),
    data.frame(key = paste0("c", 1:3), year = year[closed], kind = "closure", number = NA, survival = NA,
      delay_years = NA, recruit_weight_kg = NA))
  put("events", species = "FPP", events)
  priors(put, "FPP", rbind(series_priors("nets", nets), series_priors("boats", boats, TRUE)))
}

shape <- function(case, law) {
  set.seed(107)
  year <- 1997:2018
  f <- c(seq(0.06, 0.3, length.out = 12), rep(0.12, 10)) * exp(0.15 * rnorm(22))
  true <- course(30, 0.15, 0.5, 0.1, f, 0.8)
  put <- stock(case, "invented-six", "FPE", "Invented Lake Six")
  put("catches", species = "FPE", year = year, sector = "commercial", catch_t = noisy(true$catch, 0.1), cv = 0.1)
  nets <- noisy(0.04 * true$middle, 0.2)
  put("surveys", species = "FPE", year = year, series = "nets", time_of_year = 0.5, kind = "index", value = nets, cv = "")
  priors(put, "FPE", series_priors("nets", nets), shape = law)
}

albacore(); gaps(); two_indices(); catch_only(); marked(); closed_stocked()
shape("shape", c(1, 0.4)); shape("fox", c(0.0001, 0))
