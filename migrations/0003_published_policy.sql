-- Version 1 of the prescribing policy: the published defaults. A program changes them by a further version.
INSERT INTO policies (version, content, note) VALUES (1, '{
  "version": 1,
  "intensity": {
    "wide": {
      "lower": 0.4,
      "upper": 0.8
    },
    "narrow": {
      "lower": 0.4,
      "upper": 0.6
    },
    "lowCapacity": {
      "lower": 0.3,
      "upper": 0.6
    }
  },
  "percentOfPeak": {
    "lower": 0.65,
    "upper": 0.8
  },
  "restingPlus": {
    "lower": 20,
    "upper": 30,
    "cap": 120
  },
  "margin": {
    "ischemia": 10,
    "angina": 10,
    "arrhythmia": 10,
    "bloodPressure": 10,
    "symptom": 10,
    "icd": 10,
    "tracking": 10
  },
  "askLine": {
    "above": 10
  },
  "range": {
    "minimumWidth": 5
  },
  "reserve": {
    "minimum": 25
  },
  "resting": {
    "maximumSpread": 10
  },
  "test": {
    "validDays": 180
  },
  "reviewDueDays": 30,
  "arm": {
    "rateBelowLegs": 10,
    "workFraction": 0.45
  },
  "walk": {
    "startFraction": 0.7
  },
  "pressureCeiling": {
    "systolic": 150,
    "diastolic": 90
  },
  "oxygenFloor": 88,
  "equipment": {
    "treadmill": {
      "speedMph": 0.1,
      "gradePercent": 0.5
    },
    "cycle": {
      "power": 5
    },
    "arm": {
      "power": 5
    },
    "step": {
      "lowest": 0.1,
      "highest": 0.3,
      "by": 0.05
    }
  }
}'::jsonb, 'Published defaults');
