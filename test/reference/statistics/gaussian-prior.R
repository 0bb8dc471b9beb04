# Logistic fits under a Gaussian prior by arm::bayesglm, an implementation that is not ours.
#
# Makes gaussian-prior.json and r-data-sets.json. R is not needed by the tests; to make them again:
#   Debian 12: apt-get install r-base-core r-cran-arm    (R 4.2.2, arm 1.13-1)
#   Rscript test/reference/statistics/gaussian-prior.R    (from the root of the repository)
#   npx prettier --write test/reference/statistics
#
# prior.df = Inf makes the prior Gaussian, scaled = FALSE keeps its sds as given, and the small
# epsilon lets Newton's steps go on until the covariance is the one at the mode. A load is a 0/1
# column whose coefficient has mean 0 and sd loadSd.
suppressMessages(library(arm))

here <- "test/reference/statistics"
published <- function(name) read.csv(file.path("datasets/published", paste0("stats-", name, ".csv")))

o_rings <- published("challenger")
vaso <- published("vasoconstriction")
bioassay <- published("bioassay")

admissions <- as.data.frame(UCBAdmissions)
applicants <- aggregate(Freq ~ Gender + Dept, admissions, sum)
admitted <- subset(admissions, Admit == "Admitted")
admitted <- admitted[order(admitted$Dept, admitted$Gender), ]
applicants <- applicants[order(applicants$Dept, applicants$Gender), ]
stopifnot(all(admitted$Dept == applicants$Dept), all(admitted$Gender == applicants$Gender))

# Designs; the tests build the same ones from the same rows.
data_sets <- list(
  "o-rings" = list(
    rows = cbind(1, (o_rings$temperature_F - 70) / 10), outcome = o_rings$any_distress,
    weight = rep(1, nrow(o_rings)),
    load = match(o_rings$leak_test_pressure_psi, c(50, 100, 200)) - 1
  ),
  "vasoconstriction" = list(
    rows = cbind(1, log(vaso$volume_l), log(vaso$rate_l_per_s)), outcome = vaso$y,
    weight = rep(1, nrow(vaso))
  ),
  "bioassay" = list(
    rows = cbind(1, bioassay$log_dose_log_g_per_ml), outcome = bioassay$deaths / bioassay$animals,
    weight = bioassay$animals
  ),
  "infert" = list(
    rows = cbind(1, infert$age - 30, infert$parity, infert$spontaneous, infert$induced),
    outcome = infert$case, weight = rep(1, nrow(infert)), load = infert$stratum - 1
  ),
  "admissions" = list(
    rows = cbind(1, as.numeric(admitted$Gender == "Female")),
    outcome = admitted$Freq / applicants$Freq, weight = applicants$Freq,
    load = as.integer(admitted$Dept) - 1
  )
)

fit_case <- function(name, mean, sd, load_sd = NA) {
  data <- data_sets[[name]]
  columns <- ncol(data$rows)
  X <- data$rows
  if (!is.na(load_sd)) {
    loads <- max(data$load) + 1
    X <- cbind(X, outer(data$load, seq_len(loads) - 1, "==") * 1)
    mean <- c(mean, rep(0, loads))
    sd <- c(sd, rep(load_sd, loads))
  }
  y <- data$outcome
  w <- data$weight
  fit <- suppressWarnings(bayesglm(y ~ 0 + X,
    family = binomial, weights = w, prior.mean = mean, prior.scale = sd, prior.df = Inf,
    scaled = FALSE, drop.baseline = FALSE, control = glm.control(epsilon = 1e-15, maxit = 200), maxit = 200
  ))
  b <- unname(coef(fit))
  V <- unname(vcov(fit))
  stopifnot(length(b) == ncol(X), all(is.finite(b)))
  eta <- drop(X %*% b)
  log_likelihood <- sum(w * (y * plogis(eta, log.p = TRUE) + (1 - y) * plogis(-eta, log.p = TRUE)))
  log_prior <- sum(dnorm(b, mean, sd, log = TRUE))
  log_det <- as.numeric(determinant(V, logarithm = TRUE)$modulus)
  beyond <- seq_len(ncol(X)) > columns
  list(
    data = name, priorMean = mean[!beyond], priorSd = sd[!beyond], loadSd = load_sd,
    mean = b[!beyond], covariance = V[!beyond, !beyond, drop = FALSE],
    loadMean = b[beyond], loadVariance = diag(V)[beyond],
    logEvidence = log_likelihood + log_prior + length(b) / 2 * log(2 * pi) + log_det / 2
  )
}

cases <- list(
  fit_case("o-rings", c(0, 0), c(2, 1)),
  fit_case("o-rings", c(1, -2), c(0.5, 0.4)),
  fit_case("o-rings", c(-1, -1), c(2, 1.2), 0.5),
  fit_case("vasoconstriction", c(0, 0, 0), c(2, 1.5, 1.5)),
  fit_case("vasoconstriction", c(-1, 3, 2), c(1, 0.8, 0.6)),
  fit_case("bioassay", c(0, 0), c(10, 2.5)),
  fit_case("bioassay", c(0.5, 6), c(1, 2)),
  fit_case("infert", c(0, 0, 0, 0, 0), c(2, 0.12, 0.6, 0.9, 0.9)),
  fit_case("infert", c(-1, 0.05, -0.5, 1, 0.5), c(2, 0.06, 0.3, 1.2, 0.9), 0.5),
  fit_case("admissions", c(0, 0), c(2, 0.6)),
  fit_case("admissions", c(1, -0.5), c(2, 0.3), 0.5)
)

# The fewest digits that read back as the same number.
number <- function(x) {
  short <- sprintf("%.15g", x)
  ifelse(is.na(x), "null", ifelse(as.numeric(short) == x, short, sprintf("%.17g", x)))
}
vector <- function(x) paste0("[", paste(number(x), collapse = ", "), "]")
rows <- function(m) paste0("[", paste(apply(m, 1, vector), collapse = ", "), "]")
text <- function(x) paste0('"', x, '"')
object <- function(fields) {
  paste0("{", paste(text(names(fields)), unlist(fields), sep = ": ", collapse = ",\n"), "}")
}

case_json <- function(case) {
  object(list(
    data = text(case$data), priorMean = vector(case$priorMean), priorSd = vector(case$priorSd),
    loadSd = number(case$loadSd), mean = vector(case$mean), covariance = rows(case$covariance),
    loadMean = vector(case$loadMean), loadVariance = vector(case$loadVariance),
    logEvidence = number(case$logEvidence)
  ))
}

arm_version <- packageDescription("arm")$Version
version <- paste0(R.version$major, ".", R.version$minor)
writeLines(object(list(
  source = text(paste0(
    "R ", version, ", arm ", arm_version, ", bayesglm(prior.df = Inf, scaled = FALSE): ",
    "Gelman, Jakulin, Pittau & Su, Ann. Appl. Stat. 2 (2008) 1360-1383"
  )),
  status = text("computed here"),
  howObtained = text("gaussian-prior.R beside this file"),
  tolerance = object(list(
    mode = "1e-10", covariance = "1e-10", logEvidence = "1e-10",
    why = text(paste(
      "both programs run Newton's method to convergence, so only rounding and the last step differ:",
      "at most 1.4e-11 in the mode, 4e-12 in the covariance and 5e-12 in the evidence, measured.",
      "bayesglm's covariance is the one a step before its last: its own epsilon of 1e-8 would leave",
      "7e-9 there, so the script sets 1e-15"
    ))
  )),
  cases = paste0("[", paste(sapply(cases, case_json), collapse = ",\n"), "]")
)), file.path(here, "gaussian-prior.json"))

columns <- function(data) {
  object(list(
    rows = rows(data$rows), outcome = vector(data$outcome), weight = vector(data$weight),
    load = vector(data$load)
  ))
}
writeLines(object(list(
  source = text("the data sets infert and UCBAdmissions of R's package datasets; see each"),
  status = text(paste0("verified (as distributed with R ", version, ")")),
  howObtained = text("gaussian-prior.R beside this file"),
  tolerance = text("none: the data are exact; every number is printed in full"),
  infert = object(c(list(
    source = text(paste(
      "Trichopoulos et al. 1976, Br. J. Obst. Gynaec. 83, 645-650:",
      "248 women, secondary infertility after abortion, 83 matched strata"
    )),
    columns = text("1, age - 30, parity, spontaneous, induced; load = stratum - 1")
  ), data = columns(data_sets$infert))),
  admissions = object(c(list(
    source = text(paste(
      "Bickel, Hammel & O'Connell 1975, Science 187, 398-403:",
      "applications to the graduate school at Berkeley in 1973, six largest departments"
    )),
    columns = text("1, female; outcome = share admitted, weight = applicants, load = department A to F")
  ), data = columns(data_sets$admissions)))
)), file.path(here, "r-data-sets.json"))
