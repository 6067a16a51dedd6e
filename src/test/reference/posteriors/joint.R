# The C++ model with its data and starting values: what laplace.R and hamiltonian.R share.
suppressMessages(library(TMB))

compile_model <- function() {
  if (!file.exists(dynlib("statespace"))) compile("statespace.cpp", flags = "-O2 -Wno-ignored-attributes")
  dyn.load(dynlib("statespace"))
}

# Gauss-Legendre on [0, 1] by the eigenvalues of the recurrence's matrix (Golub & Welsch 1969)
legendre <- function(points) {
  k <- seq_len(points - 1)
  m <- matrix(0, points, points)
  m[cbind(k, k + 1)] <- m[cbind(k + 1, k)] <- k / sqrt(4 * k^2 - 1)
  e <- eigen(m, symmetric = TRUE)
  list(node = (1 + e$values) / 2, weight = e$vectors[1, ]^2)
}

joint_model <- function(d, states_random) {
  rule <- legendre(20)
  shape <- d$outer[, "shape"]
  data <- c(d[c("closed", "stocked", "fished", "log_catch", "catch_sd", "index_t", "index_series", "index_time",
    "index_log", "index_cv", "mass_t", "mass_time", "mass_log", "mass_cv", "effort_t", "effort_series", "effort_log",
    "start", "first_rate")], list(
    fox = as.integer(shape[2] == 0 && exp(shape[1]) < 1e-3), schaefer = as.integer(all(shape == 0)),
    q_mean = d$q[1, ], q_sd = d$q[2, ], middle = d$outer[1, ], spread = d$outer[2, ],
    node = rule$node, node_weight = rule$weight))
  free <- d$outer[2, ] > 0
  from <- list(u = rep(0, length(free)), x = rep(-0.6, d$T + 1), l = rep(-1.9, d$T), log_q = d$q[1, ])
  fixed <- list(u = factor(ifelse(free, seq_along(free), NA)))
  random <- if (states_random) c("x", "l", if (length(d$series)) "log_q")
  MakeADFun(data, from, random = random, map = fixed, DLL = "statespace", silent = TRUE)
}
