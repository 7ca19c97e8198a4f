package outline

const cases = 3000
