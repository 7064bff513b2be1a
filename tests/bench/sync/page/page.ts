import './floor'
import './product'
