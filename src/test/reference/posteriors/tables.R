# One case's tables as the data of the model (design: seasons t = 1..T from the first with a catch, effort or survey
# to the last closed one). Conventions that the equations leave open, and are agreed with the program under test:
#   catches     sectors add up; a season whose catches are all 0 counts as closed
#   closed      F = 0 in the dynamics, no catch and no effort likelihood; the walk of ln F goes on
#   stocking    number x survival x weight at recruitment, in season year + delay; its cv is 0.3, and the step's variance
#               gains (0.3 s/(s + 1/2))^2 with s = S/K: first order in ln(e^x + s) at half of K
#   fish kills, areas, zero indices, residual catches do not occur in these cases

table_of <- function(case, name, columns) {
  file <- file.path(case, paste0(name, ".csv"))
  rows <- if (file.exists(file)) read.csv(file, na.strings = "") else data.frame()
  for (missing in setdiff(columns, names(rows))) rows[[missing]] <- rep(NA, nrow(rows))
  for (text in intersect(c("series", "kind", "parameter"), columns)) {
    rows[[text]] <- ifelse(is.na(rows[[text]]), "", as.character(rows[[text]]))
  }
  for (number in setdiff(columns, c("series", "kind", "parameter"))) rows[[number]] <- as.numeric(rows[[number]])
  rows
}

prior_of <- function(rows, parameter, series = "") {
  own <- rows[rows$parameter == parameter & rows$series == series, ]
  if (nrow(own) == 0) own <- rows[rows$parameter == parameter & rows$series == "", ]
  stopifnot(nrow(own) == 1)
  c(log(own$median), own$log_sd)
}

model_data <- function(case) {
  cases <- read.csv("cases.csv")
  last <- cases$last_closed_year[cases$case == case]
  catches <- table_of(case, "catches", c("year", "catch_t", "cv"))
  surveys <- table_of(case, "surveys", c("year", "series", "time_of_year", "kind", "value", "cv"))
  effort <- table_of(case, "effort", c("year", "series", "effort"))
  events <- table_of(case, "events", c("year", "kind", "number", "survival", "delay_years", "recruit_weight_kg"))
  rows <- table_of(case, "priors", c("parameter", "series", "median", "log_sd"))
  first <- min(catches$year, surveys$year, effort$year)
  T <- last - first + 1
  of_season <- function(v) vapply(first:last, function(y) if (any(catches$year == y)) sum(v[catches$year == y]) else NA, 0)
  total <- of_season(catches$catch_t)
  variance <- of_season((catches$catch_t * catches$cv)^2)
  closed <- (first:last) %in% events$year[events$kind == "closure"] | (!is.na(total) & total == 0)
  fished <- which(!is.na(total) & total > 0 & !closed)

  stocked <- rep(0, T)
  for (i in which(events$kind == "stocking")) {
    t <- events$year[i] + events$delay_years[i] - first + 1
    if (t <= T) {
      tonnes <- events$number[i] * events$survival[i] * events$recruit_weight_kg[i] / 1000
      stocked[t] <- stocked[t] + tonnes
    }
  }

  index <- surveys[surveys$kind == "index", ]
  mass <- surveys[surveys$kind == "biomass", ]
  series <- c(sort(unique(index$series)), sort(unique(effort$series)))
  scatter <- vapply(series, function(s) prior_of(rows, "observation_sd", s), numeric(2), USE.NAMES = FALSE)
  q <- vapply(series, function(s) prior_of(rows, "catchability", s), numeric(2))
  outer <- cbind(sapply(c("msy_t", "fmsy", "process_sd", "harvest_sd", "shape"), function(p) prior_of(rows, p)),
    matrix(scatter, nrow = 2))
  colnames(outer) <- c("msy_t", "fmsy", "process_sd", "harvest_sd", "shape", sprintf("observation_sd:%s", series))
  list(
    first = first, last = last, T = T, closed = as.integer(closed), stocked = stocked,
    fished = fished, log_catch = log(total[fished]),
    catch_sd = sqrt(variance[fished]) / total[fished],
    index_t = index$year - first + 1, index_series = match(index$series, series), index_time = index$time_of_year,
    index_log = log(index$value), index_cv = ifelse(is.na(index$cv), 0, index$cv),
    mass_t = mass$year - first + 1, mass_time = mass$time_of_year, mass_log = log(mass$value), mass_cv = mass$cv,
    effort_t = effort$year - first + 1, effort_series = match(effort$series, series), effort_log = log(effort$effort),
    outer = outer, q = matrix(q, nrow = 2), series = series,
    start = prior_of(rows, "biomass_fraction_at_start"), first_rate = prior_of(rows, "first_harvest_rate"))
}
